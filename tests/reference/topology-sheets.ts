import type { BridgeOutput } from '#shared/engine/duties/bridges'
import type { Duty, RequirementSheet } from '#shared/engine/specification'

/** One sheet for every topology whose core is driven by volt-seconds, with figures as they are usual. */
const surroundings: Omit<RequirementSheet, 'duty'> = { ambientC: 50, permittedRiseK: null, fluxUtilisation: 0.8, targetCurrentDensityAPerMm2: 4.5, insulationMethod: 'functional', maximumHeightMm: null }
const output = (id: string, voltageV: number, fullLoadCurrentA: number, more: Partial<BridgeOutput> = {}): BridgeOutput => ({
  id, name: `Output ${id}`, role: id === 'o1' ? 'main' : 'auxiliary', voltageV, rectifierDropV: 0.6, fullLoadCurrentA, lightLoadCurrentA: fullLoadCurrentA / 10, side: 'secondary', filterInductanceH: null, rippleRatio: 0.3, rectifier: 'centre-tapped', ...more,
})
const filtered = ({ rectifier: _, ...plain }: BridgeOutput) => plain
const resonant = ({ filterInductanceH: _, rippleRatio: _ripple, ...plain }: BridgeOutput) => plain
const common = { efficiency: 0.9, switchDropV: 0.3, currentLimit: null, clampSpikeV: null, switchRatingV: null, switchingFrequencyHz: 100e3 }
const telecom = { kind: 'dc', minimumV: 36, nominalV: 48, maximumV: 72 } as const
const boosted = { kind: 'dc', minimumV: 350, nominalV: 390, maximumV: 410 } as const
const mains = { kind: 'mains', minimumV: 187, nominalV: 230, maximumV: 264, lineFrequencyHz: 50, bulkCapacitanceF: 330e-6, conductionTimeS: 3e-3 } as const

const duties: Duty[] = [
  { topology: 'forward', ...common, supply: telecom, reset: 'reset-winding', maximumDutyRatio: 0.47, outputs: [filtered(output('o1', 5, 8)), filtered(output('o2', -12, 0.5))] },
  { topology: 'forward', ...common, supply: mains, reset: 'two-switch', maximumDutyRatio: 0.45, currentLimit: { nominalA: 3, tolerance: 0.1, delayS: 300e-9 }, outputs: [filtered(output('o1', 24, 8))] },
  { topology: 'forward', ...common, supply: telecom, reset: 'active-clamp', maximumDutyRatio: 0.65, outputs: [filtered(output('o1', 3.3, 20))] },
  { topology: 'half-bridge', ...common, supply: mains, maximumDutyRatio: 0.45, outputs: [output('o1', 12, 15), output('o2', 48, 1, { rectifier: 'full-wave' })] },
  { topology: 'full-bridge', ...common, supply: boosted, control: 'phase-shift', maximumDutyRatio: 0.45, outputs: [output('o1', 48, 20, { rectifier: 'full-wave' })] },
  { topology: 'full-bridge', ...common, supply: boosted, control: 'pulse-width', maximumDutyRatio: 0.45, currentLimit: { nominalA: 6, tolerance: 0.1, delayS: 200e-9 }, outputs: [output('o1', 24, 30)] },
  { topology: 'push-pull', ...common, supply: { kind: 'dc', minimumV: 20, nominalV: 24, maximumV: 30 }, maximumDutyRatio: 0.45, outputs: [output('o1', 15, 4)] },
  { topology: 'llc', supply: boosted, efficiency: 0.95, switchDropV: 0.2, currentLimit: { nominalA: 5, tolerance: 0.1, delayS: 200e-9 }, clampSpikeV: null, switchRatingV: 650, outputs: [resonant(output('o1', 24, 10))], resonantInductanceH: 60e-6, resonantCapacitanceF: 42e-9, resonantInductor: 'separate', minimumFrequencyHz: 60e3, maximumFrequencyHz: 250e3, deadTimeS: 300e-9, bridgeCapacitanceF: 300e-12 },
]

export const TRANSFORMER_SHEETS: readonly RequirementSheet[] = duties.map((duty) => ({ ...surroundings, insulationMethod: 'supply' in duty && duty.supply.kind === 'mains' ? 'triple-insulated-wire' : 'functional', duty }))
