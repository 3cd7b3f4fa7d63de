import type { Coil } from '../build'
import type { BoundaryCapacitance, CapacitanceResult, CommonModeCapacitance, SelfResonanceResult } from '../evaluation'
import { betweenF, capacitanceNetwork, drivenF, joined, perTurnSquaredF } from '../parasitics/capacitance-network'
import type { JoinedNetwork, Tie } from '../parasitics/capacitance-network'
import { selfResonanceHz } from '../parasitics/capacitance'
import { CORE_BODY, faces } from '../parasitics/electrodes'
import type { Body } from '../parasitics/electrodes'
import { fillPermittivity } from '../parasitics/permittivity'
import type { BoundaryEnd, Winding } from '../specification'
import { coilElectrodes } from './coil-electrodes'
import { attempt, explain, positive, report } from './context'
import type { Context } from './context'
import type { InductanceBasis } from './inductance'
import { windingsAt } from './insulation-paths'

export const CAPACITANCE_MODEL = 'energy with even voltage along each winding; rows of coated wires against tape by multipoles, mean of wires in line and staggered; core as a conductor, its backs over the layer ends left out'

export interface CapacitanceResults {
  capacitances: CapacitanceResult[]
  commonModeCapacitances: CommonModeCapacitance[]
  boundaryCapacitances: BoundaryCapacitance[]
  selfResonance: SelfResonanceResult[]
}

/** Capacitances of and between the windings, across the insulation boundaries, and the resonance with the inductance. */
export function capacitanceResults(context: Context, coil: Coil | null, basis: InductanceBasis | null): CapacitanceResults {
  const network = coil && attempt(context, 'sequence', () => networkOf(context, coil))
  if (!network) {
    if (coil && coil.placements.length > 0) report(context, 'capacitance-not-calculable', 'note', 'sequence')
    return { capacitances: [], commonModeCapacitances: [], boundaryCapacitances: [], selfResonance: [] }
  }
  const perTurnF = perTurnSquaredF(network)
  const laid = context.specification.windings.filter(({ id, turns }) => network.rootOf(id) >= 0 && turns > 0)
  const wound = laid.filter(({ role }) => role !== 'shield')
  const results: CapacitanceResults = {
    capacitances: [
      ...wound.map(({ id, turns }) => ({ windingIds: [id], capacitanceF: perTurnF / turns ** 2, model: CAPACITANCE_MODEL })),
      ...pairs(laid).map(([one, other]) => ({ windingIds: [one.id, other.id], capacitanceF: betweenF(network, [one.id], [other.id]), model: CAPACITANCE_MODEL })),
    ],
    commonModeCapacitances: commonMode(context, network, wound),
    boundaryCapacitances: boundaries(context, network),
    selfResonance: wound.map((winding) => resonance(basis, perTurnF, winding)),
  }
  explainCapacitances(context, results, { perTurnF, basis })
  return results
}

function networkOf(context: Context, coil: Coil): JoinedNetwork {
  const { electrodes, flanks, dielectrics } = coilElectrodes(context, coil)
  const network = capacitanceNetwork({ electrodes, faces: faces(electrodes, dielectrics), flanks, fillPermittivity: fillPermittivity(context.specification.impregnation).value })
  return joined(network, ties(context))
}

const pairs = <T>(list: readonly T[]): [T, T][] => list.flatMap((one, index) => list.slice(index + 1).map((other): [T, T] => [one, other]))

/** Windings, shields and core that share a terminal have one potential there. */
function ties({ specification }: Context): Tie[] {
  const at = new Map<string, Tie['a']>()
  const found: Tie[] = []
  const meet = (terminal: string, place: Tie['a']) => {
    const known = at.get(terminal)
    if (known) found.push({ a: known, b: place })
    else if (terminal !== '') at.set(terminal, place)
  }
  for (const { id, startTerminal, finishTerminal, turns } of specification.windings) {
    meet(startTerminal, { body: id, turns: 0 })
    meet(finishTerminal, { body: id, turns })
  }
  for (const step of specification.sequence) if (step.kind === 'shield') meet(step.connectedTerminal, { body: step.windingId, turns: 0 })
  const potential = specification.core.potential.value
  if (potential?.connection === 'pin' && potential.pin) meet(potential.pin, { body: CORE_BODY, turns: 0 })
  return found
}

function commonMode({ primary }: Context, network: JoinedNetwork, wound: readonly Winding[]): CommonModeCapacitance[] {
  if (!primary || !(primary.turns > 0)) return []
  const driven = { body: primary.id, turns: primary.turns }
  return wound
    .filter(({ id, side }) => id !== primary.id && side !== primary.side)
    .map(({ id, turns }) => ({
      windingId: primary.id,
      ontoWindingId: id,
      startsRestingF: drivenF(network, { driven, onto: { body: id, turns }, resting: 'start' }),
      finishesRestingF: drivenF(network, { driven, onto: { body: id, turns }, resting: 'finish' }),
      model: CAPACITANCE_MODEL,
    }))
}

function boundaries({ specification }: Context, network: JoinedNetwork): BoundaryCapacitance[] {
  const bodies = (end: BoundaryEnd): Body[] => (end.kind === 'core' ? [CORE_BODY] : windingsAt(specification, end).map(({ id }) => id)).filter((body) => network.rootOf(body) >= 0)
  return specification.insulation.boundaries.map(({ id, between: [one, other] }) => ({ boundaryId: id, capacitanceF: betweenF(network, bodies(one), bodies(other)), model: CAPACITANCE_MODEL }))
}

/** The same frequency whichever winding it is seen from, since inductance and capacitance go by the square of the turns. */
function resonance(basis: InductanceBasis | null, perTurnF: number, { id, turns }: Winding): SelfResonanceResult {
  const model = 'inductance and winding capacitance as one parallel circuit, other windings open'
  const inductanceH = basis ? basis.nominalH * (turns / basis.turns) ** 2 : null
  const capacitanceF = perTurnF / turns ** 2
  // Turns at the edge of what a document may hold run over.
  const known = positive(inductanceH) && positive(capacitanceF)
  return { windingId: id, frequencyHz: known ? selfResonanceHz({ inductanceH, capacitanceF }) : null, model }
}

function explainCapacitances(context: Context, results: CapacitanceResults, { perTurnF, basis }: { perTurnF: number; basis: InductanceBasis | null }): void {
  const source = 'J. Biela and J. Kolar, IEEE Trans. Ind. Appl. 44 (2008) 1597; Lord Rayleigh, Phil. Mag. 34 (1892) 481; A. Massarini and M. Kazimierczuk, IEEE Trans. Power Electron. 12 (1997) 671'
  const fill = fillPermittivity(context.specification.impregnation)
  const inputs = [
    { name: 'ε_fill', value: fill.value, unit: '', origin: `${fill.material}: ${fill.source} (${fill.confidence})` },
    { name: 'layers', value: 'coil layout', unit: '', origin: 'layout' },
  ]
  const windingOf = (id: string) => context.specification.windings.find((winding) => winding.id === id)
  results.capacitances.forEach(({ windingIds, capacitanceF }, index) => {
    const winding = windingIds.length === 1 ? windingOf(windingIds[0]!) : undefined
    explain(context, `capacitances.${index}.capacitanceF`, () =>
      winding
        ? { symbol: 'C_w', value: capacitanceF, unit: 'F', formula: '2·W_e(1 V/turn)/N²', source, inputs: [{ name: '2·W_e', value: perTurnF, unit: 'F', origin: 'energy of the coil at one volt per turn, others floating' }, { name: 'N', value: winding.turns, unit: '', origin: 'windings.turns' }, ...inputs] }
        : { symbol: 'C_ww', value: capacitanceF, unit: 'F', formula: '2·W_e/U², each winding shorted on itself, the rest floating', source, inputs },
    )
  })
  results.commonModeCapacitances.forEach((result, index) => {
    for (const field of ['startsRestingF', 'finishesRestingF'] as const) {
      const end = field === 'startsRestingF' ? 'starts' : 'finishes'
      explain(context, `commonModeCapacitances.${index}.${field}`, () => ({ symbol: 'C_cm', value: result[field], unit: 'F', formula: `−Q/U, ${end} at rest`, source, inputs }))
    }
  })
  results.boundaryCapacitances.forEach(({ capacitanceF }, index) =>
    explain(context, `boundaryCapacitances.${index}.capacitanceF`, () => ({ symbol: 'C_b', value: capacitanceF, unit: 'F', formula: '2·W_e/U² between both ends of the boundary', source, inputs })),
  )
  results.selfResonance.forEach(({ windingId, frequencyHz }, index) =>
    explain(context, `selfResonance.${index}.frequencyHz`, () => ({
      symbol: 'f_0', value: frequencyHz, unit: 'Hz', formula: '1/(2π·√(L·C_w))', source: 'parallel resonance without loss',
      inputs: [
        { name: 'L', value: basis ? basis.nominalH * ((windingOf(windingId)?.turns ?? 0) / basis.turns) ** 2 : 'not known', unit: 'H', origin: 'magnetics.inductanceH' },
        { name: 'C_w', value: perTurnF / (windingOf(windingId)?.turns ?? 1) ** 2, unit: 'F', origin: 'capacitances' },
      ],
    })),
  )
}
