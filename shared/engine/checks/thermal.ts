import { systemMembers } from '../evaluate/thermal-members'
import { atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

type Severity = Outcome['severity']
type Step = { above: number; severity: Severity }

/** The limit that a value breaks, or the lowest one when it breaks none. Steps descend. */
const stepOf = (steps: readonly Step[], value: number): Step => steps.find(({ above }) => value > above) ?? steps[steps.length - 1]!

function byWinding({ document, evaluation }: CheckInput, of: (result: CheckInput['evaluation']['windings'][number]) => number | null, rule: { steps: readonly Step[]; unit: string; field: string }): Outcome[] {
  return evaluation.windings.flatMap((result, index) => {
    const winding = document.specification.windings[index]!
    if (winding.role === 'shield') return []
    const value = of(result)
    const path = `windings.${index}.${rule.field}`
    const step = stepOf(rule.steps, value ?? 0)
    return [atMost({ value, limit: step.above, unit: rule.unit, path, values: { winding: winding.name }, severity: value === null ? 'M' : step.severity })]
  })
}

function currentDensity(input: CheckInput): Outcome[] {
  const { marginK } = input.evaluation.thermal
  // Above 12 A/mm² only a temperature that holds speaks for the winding.
  const proven = marginK !== null && marginK >= 0
  const steps: Step[] = [{ above: 12, severity: proven ? 'M' : 'S' }, { above: 8, severity: 'M' }, { above: 6, severity: 'N' }]
  return byWinding(input, ({ currentDensityAPerMm2 }) => currentDensityAPerMm2, { steps, unit: 'A/mm²', field: 'wire' })
}

/** Where the alternating current makes less of the winding's loss than this, skin and proximity decide nothing. */
const SMALL_AC_LOSS_SHARE = 0.25

/** Nor where it makes less of the whole part's loss than this: an auxiliary winding beside the gap may lose many times its little own. */
const SMALL_SHARE_OF_PART = 0.1

/** Loss by alternating currents in a winding, as a share of its copper loss and of the part's loss; null where not known. */
function acLossShares({ evaluation }: CheckInput, index: number): { ofWinding: number; ofPart: number } | null {
  const result = evaluation.windings[index]
  if (result?.skinLossW == null || result.proximityLossW == null || result.copperLossW === null) return null
  const acLossW = result.skinLossW + result.proximityLossW
  const { totalW, copperW } = evaluation.losses
  const partW = totalW ?? copperW
  return { ofWinding: acLossW > 0 ? acLossW / result.copperLossW : 0, ofPart: partW !== null && partW > 0 ? acLossW / partW : 1 }
}

const windingIndex = ({ path }: Outcome) => Number(path.split('.')[1])

/** A winding that hardly loses by alternating current meets its rules. */
const unlessDirect = (input: CheckInput) => (outcome: Outcome): Outcome => {
  const shares = acLossShares(input, windingIndex(outcome))
  if (outcome.state !== 'not-met' || !shares) return outcome
  if (shares.ofWinding < SMALL_AC_LOSS_SHARE) return { ...outcome, state: 'met', values: { ...outcome.values, acLossShare: shares.ofWinding } }
  if (shares.ofPart < SMALL_SHARE_OF_PART) return { ...outcome, state: 'met', values: { ...outcome.values, partLossShare: shares.ofPart } }
  return outcome
}

/** Conductors of one form against a multiple of the skin depth. */
function againstSkinDepth(input: CheckInput, form: 'round' | 'litz', multiple: number): Outcome[] {
  const { windings } = input.document.specification
  return input.evaluation.windings.flatMap((result, index) => {
    const winding = windings[index]!
    const wire = input.context.index.find('wire', winding.wire.wire)
    if (winding.role === 'shield' || wire?.form !== form) return []
    const limit = result.skinDepthMm === null ? null : result.skinDepthMm * multiple
    return [atMost({ value: wire.conductorMm, limit, unit: 'mm', path: `windings.${index}.wire`, values: { winding: winding.name } })]
  }).map(unlessDirect(input))
}

const skinDepth = (input: CheckInput) => againstSkinDepth(input, 'round', 2)
const litzStrand = (input: CheckInput) => againstSkinDepth(input, 'litz', 1 / 3)

/**
 * The limits are meant for the one-dimensional factor; beside a gap or at the ends of a layer the local field may make many times that,
 * which is asked about on its own.
 */
const resistanceFactor = (input: CheckInput) =>
  [
    ...byWinding(input, ({ acFactor, acFactorOneDimensional }) => acFactorOneDimensional ?? acFactor, { steps: [{ above: 4, severity: 'S' }, { above: 2.5, severity: 'M' }, { above: 1.5, severity: 'N' }], unit: '1', field: 'wire' }),
    ...localFactor(input),
  ]
    // A winding without alternating current has no factor, and nothing to check.
    .filter((outcome) => outcome.state !== 'not-checkable' || input.evaluation.windings[windingIndex(outcome)]?.copperLossW !== 0)
    .map(unlessDirect(input))
    .map(ofRipple(input))

/** A high factor of the small ripple on a direct current is asked about and stops nothing: its heat is in the temperature. */
const ofRipple = (input: CheckInput) => (outcome: Outcome): Outcome => {
  const result = input.evaluation.windings[windingIndex(outcome)]
  if (outcome.state !== 'not-met' || outcome.severity !== 'S' || !result || result.acFactor === null || result.dcLossW === null) return outcome
  const plainAcW = ((result.skinLossW ?? 0) + (result.proximityLossW ?? 0)) / result.acFactor
  return plainAcW < SMALL_AC_LOSS_SHARE * (plainAcW + result.dcLossW) ? { ...outcome, severity: 'M', values: { ...outcome.values, ripple: 1 } } : outcome
}

const localFactor = (input: CheckInput) =>
  byWinding(input, ({ acFactor, acFactorOneDimensional }) => (acFactorOneDimensional === null ? null : acFactor), { steps: [{ above: 4, severity: 'M' }], unit: '1', field: 'wire' })
    .filter(({ state }) => state === 'not-met')
    .map((outcome) => ({ ...outcome, values: { ...outcome.values, field: 'local' } }))

const lossDensity = ({ evaluation }: CheckInput): Outcome[] => [atMost({ value: evaluation.losses.coreDensityWPerM3, limit: 300e3, unit: 'W/m³', path: 'core.material' })]

/** Where the loss over temperature is least, °C; null without a loss fit. */
function leastLossC({ context, document }: CheckInput): number | null {
  const frequencyHz = document.specification.electrical.switchingFrequencyHz.value?.minimum ?? 0
  const fits = context.material?.lossFits ?? []
  const fit = fits.find(({ minimumHz, maximumHz }) => frequencyHz >= minimumHz && frequencyHz <= maximumHz) ?? fits[0]
  return fit && fit.ct2 > 0 ? fit.ct1 / (2 * fit.ct2) : null
}

function runaway(input: CheckInput): Outcome[] {
  const { loopGain, evaluation } = input
  const leastC = leastLossC(input)
  return [
    atMost({ value: loopGain, limit: 1, unit: '1', path: 'core.material' }),
    atMost({ value: evaluation.thermal.windingC, limit: leastC === null ? null : leastC + 20, unit: '°C', path: 'core.material', values: leastC === null ? {} : { leastLossC: leastC } }),
  ]
}

function classMargin({ evaluation, document }: CheckInput): Outcome[] {
  const { windingC, limitC, riseK } = evaluation.thermal
  const permittedK = document.requirement?.permittedRiseK ?? null
  return [
    atMost({ value: windingC, limit: limitC === null ? null : limitC - 5, unit: '°C', path: 'insulation.systemThermalClassC', values: { marginK: 5 } }),
    ...(permittedK === null ? [] : [atMost({ value: riseK, limit: permittedK, unit: 'K', path: 'requirement.permittedRiseK' })]),
  ]
}

function weakestMember({ document, context }: CheckInput): Outcome[] {
  const members = systemMembers(context)
  const systemC = document.specification.insulation.systemThermalClassC.value
  if (systemC === null || members.length === 0) return [notCheckable('insulation.systemThermalClassC')]
  const weakest = members.reduce((least, member) => (member.classC < least.classC ? member : least))
  return [atMost({ value: systemC, limit: weakest.classC, unit: '°C', path: 'insulation.systemThermalClassC', values: { weakest: weakest.name, members: members.map(({ name, classC }) => `${name} ${classC}`).join(', ') } })]
}

const ambientStated = ({ document }: CheckInput): Outcome[] => [yesNo(document.requirement !== null || document.specification.insulation.maximumAmbientC.value !== null, 'insulation.maximumAmbientC')]

export const THERMAL_CHECKS: Readonly<Record<string, Check>> = {
  T01: { severity: 'M', source: 'natural convection: common practice', run: currentDensity },
  T02: { severity: 'M', source: 'diameter up to two skin depths: Snelling', run: skinDepth },
  T03: { severity: 'M', source: 'limits for the factor by P. Dowell, Proc. IEE 113 (1966) 1387', run: resistanceFactor },
  T04: { severity: 'M', source: 'strands up to a third of the skin depth: Sullivan 1999', run: litzStrand },
  T07: { severity: 'M', source: 'K. Venkatachalam et al., IEEE COMPEL 2002; 300 kW/m³ under natural convection: common practice', run: lossDensity },
  T08: { severity: 'S', source: 'heat balance; loss curve of the material, 20 K beyond its least', run: runaway },
  T11: { severity: 'S', source: 'IEC 62368-1 G.5.3, IEC 61558-1: winding limits by class, 5 K margin', run: classMargin },
  T12: { severity: 'S', source: 'IEC 60085, UL 1446: a system is as good as its weakest member', run: weakestMember },
  T16: { severity: 'M', source: 'common practice', run: ambientStated },
}
