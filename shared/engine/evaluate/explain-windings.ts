import type { WindingResult } from '../evaluation'
import { explain } from './context'
import type { Context } from './context'
import type { WindingCopper } from './copper'

export interface ExplainedWinding {
  index: number
  copper: WindingCopper
  result: WindingResult
  hotC: number
  /** Name of the field the losses rest on. */
  field: string
}

const LOSS_SOURCE = 'C. Sullivan, IEEE Trans. Power Electron. 16 (2001) 142 and 14 (1999) 283; cylinder and foil functions exact (Lammeraner and Štafl 1966, Vandelac and Ziogas 1988), reaction of a row by Rayleigh 1892'

/** How each figure of a winding came about. */
export function explainWinding(context: Context, explained: ExplainedWinding): void {
  const { index, copper, result, hotC } = explained
  const { winding, wire } = copper
  const path = (field: keyof WindingResult) => `windings.${index}.${field}`
  const length = { name: 'l', value: copper.wireLengthM, unit: 'm', origin: 'coil layout: N·MLT and both leads' }
  const rowOrigin = `${wire.name}: ${wire.source}${wire.edition ? `, ${wire.edition}` : ''} (${wire.confidence})`
  explain(context, path('wireLengthM'), () => ({
    symbol: 'l', value: copper.wireLengthM, unit: 'm', formula: 'N·MLT + l_leads', source: 'geometry of the coil layout',
    inputs: [{ name: 'N', value: winding.turns, unit: '', origin: `windings.${index}.turns` }, { name: 'MLT', value: copper.meanTurnLengthMm, unit: 'mm', origin: 'coil layout' }, { name: 'l_leads', value: copper.leadsMm, unit: 'mm', origin: context.former ? 'coil former' : 'free ends of a ring' }],
  }))
  explain(context, path('dcResistance20Ohm'), () => ({
    symbol: 'R_20', value: copper.resistance20Ohm, unit: 'Ω', formula: "R'·l/n", source: 'IEC 60317-0-1, nominal resistance',
    inputs: [{ name: "R'", value: wire.resistance20.nominalOhmPerM, unit: 'Ω/m', origin: rowOrigin }, length, { name: 'n', value: winding.wire.parallel, unit: '', origin: `windings.${index}.wire.parallel` }],
  }))
  explain(context, path('dcResistanceHotOhm'), () => ({
    symbol: 'R_hot', value: result.dcResistanceHotOhm, unit: 'Ω', formula: 'R_20·(1 + 0.00393·(T − 20 °C))', source: 'IEC 60028:1925',
    inputs: [{ name: 'R_20', value: copper.resistance20Ohm, unit: 'Ω', origin: path('dcResistance20Ohm') }, { name: 'T', value: hotC, unit: '°C', origin: 'thermal.windingC' }],
  }))
  explain(context, path('currentDensityAPerMm2'), () => ({
    symbol: 'J', value: result.currentDensityAPerMm2, unit: 'A/mm²', formula: 'I_rms/A_Cu', source: 'definition',
    inputs: [{ name: 'I_rms', value: result.rmsA ?? 'not known', unit: 'A', origin: 'largest of the full-load corners' }, { name: 'A_Cu', value: copper.copperAreaMm2, unit: 'mm²', origin: rowOrigin }],
  }))
  explainLosses(context, explained)
}

function explainLosses(context: Context, { index, copper, result, hotC, field }: ExplainedWinding): void {
  const path = (name: keyof WindingResult) => `windings.${index}.${name}`
  const input = (name: string, of: keyof WindingResult, unit: string) => ({ name, value: (result[of] as number | null) ?? 'not known', unit, origin: path(of) })
  const resistance = input('R_hot', 'dcResistanceHotOhm', 'Ω')
  const at = [
    { name: 'field', value: field, unit: '', origin: 'model' },
    { name: 'conductor', value: conductorText(copper), unit: '', origin: `${copper.wire.name}: ${copper.wire.source}` },
    { name: 'T', value: hotC, unit: '°C', origin: 'thermal.windingC' },
    { name: 'harmonics', value: 'until 1 % of the ac loss is left', unit: '', origin: 'losses.harmonics' },
  ]
  const tell = (name: keyof WindingResult, symbol: string, formula: string, inputs: { name: string; value: number | string; unit: string; origin: string }[], source = LOSS_SOURCE) =>
    explain(context, path(name), () => ({ symbol, value: result[name] as number | null, unit: name.startsWith('acFactor') ? '' : 'W', formula, source, inputs }))
  tell('dcLossW', 'P_dc', 'R_hot·I_dc²', [resistance, { name: 'I_dc', value: 'of the corner', unit: 'A', origin: 'corners' }], 'Ohm’s and Joule’s laws')
  tell('skinLossW', 'P_skin', 'R_hot·Σ F(n)·I_n²', [resistance, ...at])
  tell('proximityLossW', 'P_prox', 'Σ_n Σ_layers ℓ·(G_x·|H_x|² + G_y·|H_y|²), x along the layer, y across it, H = Σ_windings h_w·I_w(n) as phasors', at)
  tell('idleLossW', 'P_idle', 'P_prox with the winding’s own current left out', at)
  tell('copperLossW', 'P_Cu', 'P_dc + P_skin + P_prox', [input('P_dc', 'dcLossW', 'W'), input('P_skin', 'skinLossW', 'W'), input('P_prox', 'proximityLossW', 'W')], 'J. Ferreira, IEEE Trans. Power Electron. 9 (1994) 127: skin and proximity are orthogonal')
  tell('acFactorOneDimensional', 'F_R,1D', 'as F_R, with the field along the layers over the whole window and the gap spread along the leg', at.slice(1), 'P. Dowell, Proc. IEE 113 (1966) 1387; J.-P. Vandelac and P. Ziogas, IEEE Trans. Power Electron. 3 (1988) 334')
  tell('acFactor', 'F_R', '(P_skin + P_prox)/(R_hot·I_ac²)', [input('P_skin', 'skinLossW', 'W'), input('P_prox', 'proximityLossW', 'W'), resistance], 'definition')
}

function conductorText({ conductor }: WindingCopper): string {
  switch (conductor.kind) {
    case 'round':
      return `round, ${conductor.diameterMm} mm`
    case 'litz':
      return `${conductor.strands} strands of ${conductor.strandDiameterMm} mm in a bundle of ${conductor.bundleDiameterMm} mm`
    case 'foil':
      return `foil, ${conductor.thicknessMm} mm × ${conductor.breadthMm} mm`
  }
}
