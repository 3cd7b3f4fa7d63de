import type { Evaluation, LossResult, RingLayout, Working } from '../evaluation'
import type { CoreRow } from '../library'
import { explain } from './context'
import type { Context } from './context'
import { originOf } from './inductance'
import { LOSS_MODEL, THERMAL_MODEL } from './thermal'

type Input = Working['inputs'][number]
type Told = Pick<Working, 'symbol' | 'unit' | 'formula' | 'source'> & { inputs?: Input[] }
type Body = Omit<Evaluation, 'checks'>

const GEOMETRY = 'geometry of the coil layout'
const from = (name: string, value: number | string | null | undefined, unit: string, origin: string): Input => ({ name, value: value ?? 'not known', unit, origin })

/** How each figure came about that its own stage has not told yet. */
export function explainResults(context: Context, body: Body): void {
  if (!context.working) return
  const tell = (base: string, result: object, told: Readonly<Record<string, Told>>) => {
    for (const [field, entry] of Object.entries(told)) {
      const path = `${base}.${field}`
      const value = (result as Readonly<Record<string, number | null>>)[field] ?? null
      if (!context.working?.[path]) explain(context, path, () => ({ inputs: [], ...entry, value }))
    }
  }
  tell('magnetics', body.magnetics, magnetics(context, body))
  body.windings.forEach((winding, index) => tell(`windings.${index}`, winding, windings(context, body, index)))
  tell('layout', body.layout, layout(context, body))
  if (body.layout.ring) tell('layout.ring', body.layout.ring, ring(context))
  tell('losses', body.losses, losses(context, body, body.losses))
  body.lossesByCorner.forEach((loss, index) => tell(`lossesByCorner.${index}`, loss, losses(context, body, loss)))
  tell('thermal', body.thermal, thermal(context, body))
  tell('mass', body.mass, mass(context))
  body.boundaries.forEach(({ provided, required }, index) => {
    tell(`boundaries.${index}.provided`, provided, providedFigures(provided.how))
    tell(`boundaries.${index}.required`, { layers: required.layers.value }, { layers: { symbol: 'n', unit: 'layers', formula: 'row of the standard', source: required.layers.source } })
  })
}

function magnetics(context: Context, { magnetics: own, thermal: heat }: Body): Record<string, Told> {
  const limit = context.specification.electrical.inductance.value
  const inputs = [from('L', own.inductanceH, 'H', 'electrical.inductance')]
  return {
    inductanceMinimumH: { symbol: 'L_min', unit: 'H', formula: 'L·(1 − tol)', source: 'tolerance as stated', inputs: [...inputs, from('tol', limit?.lowerTolerance, '', 'electrical.inductance')] },
    inductanceMaximumH: { symbol: 'L_max', unit: 'H', formula: 'L·(1 + tol)', source: 'tolerance as stated', inputs: [...inputs, from('tol', limit?.upperTolerance, '', 'electrical.inductance')] },
    alH: { symbol: 'A_L', unit: 'H', formula: context.specification.core.gap.alH.value === null ? 'L/N²' : 'as specified', source: 'IEC 62044-2, definition of A_L', inputs: [...inputs, from('N', context.primary?.turns, '', 'windings.turns')] },
    fringingFactor: { symbol: 'F', unit: '', formula: '1 + l_g/√A_g·ln(2G/l_g)', source: 'C. McLyman, Transformer and Inductor Design Handbook, 3rd ed. 2004', inputs: [from('l_g', own.gapMm, 'mm', 'magnetics.gapMm')] },
    saturationTemperatureC: { symbol: 'T_sat', unit: '°C', formula: 'max(100 °C, T_w)', source: 'saturation is taken hot: common practice', inputs: [from('T_w', heat.windingC, '°C', 'thermal.windingC')] },
    fluxUtilisation: { symbol: 'B̂_max/B_sat', unit: '', formula: 'B̂_max/B_sat', source: 'definition', inputs: [from('B̂_max', own.fluxWorstT, 'T', 'magnetics.fluxWorstT'), from('B_sat', own.saturationT, 'T', 'magnetics.saturationT')] },
    boundaryInductanceH: { symbol: 'L_b', unit: 'H', formula: '(U_p·D)²/(2·P·f)', source: 'Fairchild AN-4137; L. Dixon, SLUP127', inputs: [from('corner', 'minimum-input', '', 'corners')] },
  }
}

function windings(context: Context, { windings: results, corners }: Body, index: number): Record<string, Told> {
  const winding = context.specification.windings[index]!
  const result = results[index]!
  const wire = context.index.find('wire', winding.wire.wire)
  const stated = corners.length === 0
  const current = (symbol: string, formula: string): Told => ({ symbol, unit: 'A', formula: stated ? 'as stated for the winding' : formula, source: stated ? 'specification' : 'corners at full load', inputs: [from('winding', winding.name, '', `windings.${index}`)] })
  return {
    copperAreaMm2: { symbol: 'A_Cu', unit: 'mm²', formula: 'n·A', source: wire ? `${wire.name}: ${wire.source}` : 'not in the library', inputs: [from('n', winding.wire.parallel, '', `windings.${index}.wire.parallel`), from('A', wire?.copperAreaMm2, 'mm²', 'library')] },
    meanTurnLengthMm: { symbol: 'MLT', unit: 'mm', formula: 'Σ turns·length of a turn at its layer/N', source: GEOMETRY, inputs: [from('layers', result.layers, '', 'coil layout')] },
    rmsA: current('I_rms', 'largest rms of the full-load corners'),
    peakA: current('Î', 'largest peak of the full-load corners'),
    dcA: current('I_dc', 'largest mean of the full-load corners'),
    copperMassG: { symbol: 'm', unit: 'g', formula: 'A_Cu·l·8890 kg/m³', source: 'IEC 60028:1925', inputs: [from('A_Cu', result.copperAreaMm2, 'mm²', `windings.${index}.copperAreaMm2`), from('l', result.wireLengthM, 'm', `windings.${index}.wireLengthM`)] },
    skinDepthMm: { symbol: 'δ', unit: 'mm', formula: '√(ρ/(π·µ0·f))', source: 'diffusion equation; IEC 60028:1925', inputs: [from('f', context.specification.electrical.switchingFrequencyHz.value?.minimum, 'Hz', 'electrical.switchingFrequencyHz')] },
  }
}

function layout({ core, former }: Context, { layout: own }: Body): Record<string, Told> {
  if (own.ring) return unrolledRing(core, own.ring)
  const height = from('h', former?.windingHeightMm, 'mm', 'former')
  const area = from('A_w', former ? former.windingWidthMm * former.windingHeightMm : null, 'mm²', 'former')
  return {
    windowWidthMm: { symbol: 'b', unit: 'mm', formula: 'between the flanges', source: former ? `${former.name}: ${former.source}` : 'not in the library' },
    windowHeightMm: { symbol: 'h', unit: 'mm', formula: 'tube to flange edge', source: former ? `${former.name}: ${former.source}` : 'not in the library' },
    buildMm: { symbol: 'h_b', unit: 'mm', formula: '(Σ layers·d_o + Σ tapes)·bulge', source: 'bulge 1.10 on a round, 1/0.85 on a rectangular tube: common practice, McLyman', inputs: [height] },
    buildRatio: { symbol: 'h_b/h', unit: '', formula: 'h_b/h', source: GEOMETRY, inputs: [from('h_b', own.buildMm, 'mm', 'layout.buildMm'), height] },
    copperFill: { symbol: 'k_Cu', unit: '', formula: 'Σ N·n·A/A_w', source: GEOMETRY, inputs: [area] },
    windowFill: { symbol: 'k_w', unit: '', formula: 'Σ N·n·d_o²/A_w', source: GEOMETRY, inputs: [area] },
  }
}

/** The hole as a window: its circumference, and from the core to the middle. */
function unrolledRing(core: CoreRow | null, { holeMm }: RingLayout): Record<string, Told> {
  const inputs = [from('ID', holeMm, 'mm', 'layout.ring.holeMm')]
  const told = (symbol: string, unit: string, formula: string): Told => ({ symbol, unit, formula, source: core ? `${core.name}: ${core.source}` : GEOMETRY, inputs })
  return {
    windowWidthMm: told('b', 'mm', 'π·ID'),
    windowHeightMm: told('h', 'mm', 'ID/2'),
    buildMm: told('h_b', 'mm', 'Σ layers·d_o + Σ tapes, in the hole'),
    buildRatio: told('h_b/h', '', 'h_b/h'),
    copperFill: told('k_Cu', '', 'Σ N·n·A/(π·ID²/4)'),
    windowFill: told('k_w', '', 'Σ N·n·d_o²/(π·ID²/4)'),
  }
}

function ring({ core }: Context): Record<string, Told> {
  const size = core?.coatedMm ? 'over the coating' : 'bare core'
  const own = (symbol: string): Told => ({ symbol, unit: 'mm', formula: size, source: core ? `${core.name}: ${core.source}` : 'not in the library' })
  const laid = (symbol: string, formula: string): Told => ({ symbol, unit: 'mm', formula, source: 'layers on the inner circumference, π/arcsin(d/2r) wires a layer: geometry; McLyman, Transformer and Inductor Design Handbook, 3rd ed.' })
  return {
    outsideMm: own('OD'),
    holeMm: own('ID'),
    heightMm: own('H'),
    remainingHoleMm: laid('ID_rest', 'ID − 2·Σ(layers·d_o + tapes)'),
    overallOutsideMm: laid('OD_max', 'OD + 2·Σ(layers outside·d_o + tapes)'),
    overallHeightMm: laid('H_max', 'H + 2·Σ(layers·d_o + tapes)'),
    sectorGapMm: laid('s', 'least arc of the hole between two windings'),
  }
}

function losses(context: Context, { thermal: heat }: Body, own: LossResult): Record<string, Told> {
  const at = [from('corner', own.corner, '', 'the full-load corner with the greatest loss'), from('T', heat.windingC ?? 100, '°C', 'thermal.windingC')]
  return {
    copperW: { symbol: 'P_Cu', unit: 'W', formula: 'Σ_windings P_dc + P_skin + P_prox', source: LOSS_MODEL, inputs: at },
    coreW: { symbol: 'P_Fe', unit: 'W', formula: 'p_v·V_e', source: LOSS_MODEL, inputs: [...at, from('p_v', own.coreDensityWPerM3, 'W/m³', 'losses.coreDensityWPerM3'), from('V_e', context.core ? context.core.effectiveVolumeMm3 * context.sets : null, 'mm³', originOf(context, 'core'))] },
    totalW: { symbol: 'P', unit: 'W', formula: 'P_Cu + P_Fe', source: 'sum', inputs: [from('P_Cu', own.copperW, 'W', 'losses.copperW'), from('P_Fe', own.coreW, 'W', 'losses.coreW')] },
    copperOneDimensionalW: { symbol: 'P_Cu,1D', unit: 'W', formula: 'as P_Cu, with the field along the layers over the whole window', source: 'P. Dowell, Proc. IEE 113 (1966) 1387; J.-P. Vandelac and P. Ziogas, IEEE Trans. Power Electron. 3 (1988) 334', inputs: at },
    harmonics: { symbol: 'N', unit: '', formula: 'least N with a rest of at most 1 % of the ac loss, 256 at most', source: 'Parseval; bounds of Fourier coefficients (Zygmund, Trigonometric Series, II.4)' },
    harmonicTailShare: { symbol: 'r', unit: '', formula: 'estimated ac loss beyond N over ac loss; contained in P_Cu', source: 'as the number of harmonics', inputs: [from('N', own.harmonics, '', 'losses.harmonics')] },
    coreDensityWPerM3: { symbol: 'p_v', unit: 'W/m³', formula: 'k_i·ΔB^(β−α)·(1/T)·Σ|dB/dt|^α·Δt·c(T)', source: 'K. Venkatachalam et al., IEEE COMPEL 2002', inputs: [...at, from('fit', context.material?.lossFits[0]?.source ?? 'none', '', originOf(context, 'material'))] },
  }
}

function thermal({ specification, requirement }: Context, { thermal: own }: Body): Record<string, Told> {
  const { systemThermalClassC, maximumWindingC } = specification.insulation
  const stated = maximumWindingC.value
  return {
    ambientC: { symbol: 'T_amb', unit: '°C', formula: 'as stated', source: requirement ? 'requirement sheet' : 'insulation.maximumAmbientC' },
    windingC: { symbol: 'T_w', unit: '°C', formula: 'T_amb + ΔT(P(T_w)), iterated to a fixed point', source: THERMAL_MODEL, inputs: [from('T_amb', own.ambientC, '°C', 'thermal.ambientC'), from('ΔT', own.riseK, 'K', 'thermal.riseK')] },
    limitC: { symbol: 'T_lim', unit: '°C', formula: stated ? 'the lower of the row of the class and the stated limit, by thermocouple 10 K higher' : 'row of the class', source: 'IEC 62368-1 G.5.3, IEC 60085:2007, resistance method (from memory)', inputs: [from('class', systemThermalClassC.value, '°C', 'insulation.systemThermalClassC'), ...(stated ? [from(stated.method, stated.temperatureC, '°C', 'insulation.maximumWindingC')] : [])] },
    marginK: { symbol: 'T_lim − T_w', unit: 'K', formula: 'T_lim − T_w', source: 'definition', inputs: [from('T_lim', own.limitC, '°C', 'thermal.limitC'), from('T_w', own.windingC, '°C', 'thermal.windingC')] },
    surfaceMm2: { symbol: 'A', unit: 'mm²', formula: 'l·w + 2·h·(l + w)', source: 'geometry, five faces', inputs: [from('envelope', specification.former.envelope.value ? 'as specified' : 'coil former', '', 'former.envelope')] },
  }
}

const mass = (context: Context): Record<string, Told> => ({
  copperG: { symbol: 'm_Cu', unit: 'g', formula: 'Σ windings and shields', source: 'IEC 60028:1925, density of copper' },
  coreG: { symbol: 'm_Fe', unit: 'g', formula: 'mass of the set', source: originOf(context, 'core') },
  totalG: { symbol: 'm', unit: 'g', formula: 'm_Cu + m_Fe; former and insulation left out', source: 'sum' },
})

const providedFigures = (how: string): Record<string, Told> => ({
  clearanceMm: { symbol: 'd_cl', unit: 'mm', formula: how, source: GEOMETRY },
  creepageMm: { symbol: 'd_cr', unit: 'mm', formula: how, source: GEOMETRY },
  distanceThroughInsulationMm: { symbol: 'd_ti', unit: 'mm', formula: how, source: GEOMETRY },
  layers: { symbol: 'n', unit: 'layers', formula: how, source: GEOMETRY },
  testVoltageVRms: { symbol: 'U_test', unit: 'V', formula: 'as specified; d.c. over √2', source: 'insulation.boundaries' },
})
