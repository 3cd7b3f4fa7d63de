import { buildWire } from '../evaluate/lookup'
import { atMost, notCheckable, yesNo } from './outcome'
import type { Check, CheckInput, Outcome } from './outcome'

const placed = ({ coil, document }: CheckInput) =>
  (coil?.placements ?? []).map((placement) => ({ placement, winding: document.specification.windings.find(({ id }) => id === placement.windingId)!, path: `sequence.${placement.index}` }))

const isFoil = (input: CheckInput, windingId: string) => {
  const winding = input.document.specification.windings.find(({ id }) => id === windingId)
  return winding ? input.context.index.find('wire', winding.wire.wire)?.form === 'foil' : false
}

function layerWidth(input: CheckInput): Outcome[] {
  const { specification } = input.document
  const laid = placed(input).map(({ placement, winding, path }) => {
    const stated = input.document.specification.sequence[placement.index]
    const layers = stated?.kind === 'winding' && stated.layers !== null ? stated.layers : null
    const inLayer = layers === null ? Math.max(...placement.turnsPerLayer) : Math.ceil(placement.turns / Math.max(1, layers))
    const widthMm = isFoil(input, winding.id) ? placement.bundleWidthMm : (inLayer + 1) * placement.bundleWidthMm
    return atMost({ value: widthMm, limit: placement.availableMm, unit: 'mm', path, values: { winding: winding.name, turnsInLayer: inLayer } })
  })
  const missing = specification.windings.flatMap(({ id, name, role }, index) => (role === 'shield' || laidIds(input).has(id) ? [] : [notCheckable(`windings.${index}`, { winding: name })]))
  return [...laid, ...missing]
}

const laidIds = (input: CheckInput) => new Set((input.coil?.placements ?? []).map(({ windingId }) => windingId))

const overallDiameters = ({ document, context }: CheckInput): Outcome[] =>
  document.specification.windings.map((winding, index) => (buildWire(context.index, winding) ? yesNo(true, `windings.${index}.wire`, { winding: winding.name }) : notCheckable(`windings.${index}.wire`, { winding: winding.name })))

function radialBuild({ coil, context }: CheckInput): Outcome[] {
  const path = 'sequence'
  if (!coil || !context.former) return [notCheckable(path)]
  const { buildRatio, buildMm } = coil.layout
  const values = { buildMm, windowHeightMm: context.former.windingHeightMm, bulge: coil.bulge }
  const step = buildRatio > 1 ? { limit: 1, severity: 'S' as const } : buildRatio > 0.9 ? { limit: 0.9, severity: 'M' as const } : { limit: 0.85, severity: 'N' as const }
  return [atMost({ value: buildRatio, limit: buildRatio > 0.85 ? step.limit : 1, unit: '1', path, values, severity: buildRatio > 0.85 ? step.severity : 'S' })]
}

const copperFill = ({ coil }: CheckInput): Outcome[] => [coil ? atMost({ value: coil.layout.copperFill, limit: 0.5, unit: '1', path: 'sequence', values: { windowFill: coil.layout.windowFill } }) : notCheckable('sequence')]

/** An odd number of layers ends at the far flange: its lead returns over the winding and needs a sleeve. */
function layerParity(input: CheckInput): Outcome[] {
  return placed(input).flatMap(({ placement, winding, path }) => {
    const step = input.document.specification.sequence[placement.index]
    if (step?.kind !== 'winding' || isFoil(input, winding.id)) return []
    const odd = placement.turnsPerLayer.length % 2 === 1
    const met = odd ? step.finishSleeve !== null || step.leadExitFinish !== step.leadExitStart : step.leadExitFinish === step.leadExitStart || step.finishSleeve !== null
    return [yesNo(met, `${path}.leadExitFinish`, { winding: winding.name, layers: placement.turnsPerLayer.length })]
  })
}

function lastLayer(input: CheckInput): Outcome[] {
  return placed(input).flatMap(({ placement, winding, path }) => {
    const step = input.document.specification.sequence[placement.index]
    const last = placement.turnsPerLayer[placement.turnsPerLayer.length - 1] ?? 0
    const fill = placement.mostTurnsPerLayer > 0 ? last / placement.mostTurnsPerLayer : 1
    if (step?.kind !== 'winding' || isFoil(input, winding.id) || fill >= 0.7) return []
    return [yesNo(step.lay !== 'close-wound', `${path}.lay`, { winding: winding.name, fill, turns: last })]
  })
}

const layerFill = (input: CheckInput): Outcome[] =>
  placed(input).filter(({ winding }) => !isFoil(input, winding.id)).map(({ placement, winding, path }) => {
    const value = placement.availableMm > 0 ? (placement.rightMm - placement.leftMm) / placement.availableMm : null
    return value === null ? notCheckable(path, { winding: winding.name }) : { state: value >= 0.85 ? 'met' : 'not-met', value, limit: 0.85, unit: '1', path, values: { winding: winding.name } }
  })

const parallelWires = (input: CheckInput): Outcome[] =>
  input.document.specification.windings.flatMap(({ wire, name }, index) => (wire.parallel < 1 ? [{ ...yesNo(false, `windings.${index}.wire.parallel`, { winding: name }), severity: 'S' as const }] : wire.parallel > 1 ? [atMost({ value: wire.parallel, limit: 4, unit: '', path: `windings.${index}.wire.parallel`, values: { winding: name } })] : []))

const marginHeight = ({ coil }: CheckInput): Outcome[] =>
  (coil?.margins ?? []).map(({ index, topMm, bottomMm, windingTopMm }) => ({ state: topMm >= windingTopMm - 1e-9 ? 'met' : 'not-met', value: topMm - bottomMm, limit: windingTopMm - bottomMm, unit: 'mm', path: `sequence.${index}.heightMm` }))

/** What tape, adhesive and label stand over core and former at the least, mm. */
const OVER_CORE_MM = 0.3

/** The specified envelope, and never less than core and former with what stands over them. */
function overallHeight({ document, context }: CheckInput): Outcome[] {
  const limit = document.requirement?.maximumHeightMm ?? null
  if (limit === null) return []
  const stated = document.specification.former.envelope.value?.heightMm ?? null
  const bare = context.former ? context.former.envelopeMm.height + OVER_CORE_MM : 0
  return [atMost({ value: stated === null ? null : Math.max(stated, bare), limit, unit: 'mm', path: 'former.envelope' })]
}

export const WINDABILITY_CHECKS: Readonly<Record<string, Check>> = {
  W01: { severity: 'S', source: 'helix of a layer: geometry', run: layerWidth },
  W02: { severity: 'S', source: 'IEC 60317-0-1: largest overall diameter', run: overallDiameters },
  W03: { severity: 'S', source: 'bulge of 10 % on round and 18 % on rectangular tubes: common practice, McLyman', run: radialBuild },
  W04: { severity: 'M', source: 'McLyman; common practice', run: copperFill },
  W05: { severity: 'M', source: 'common practice', run: layerParity },
  W06: { severity: 'M', source: 'common practice', run: lastLayer },
  W07: { severity: 'N', source: 'coupling: common practice', run: layerFill },
  W08: { severity: 'M', source: 'machine winding: common practice', run: parallelWires },
  W25: { severity: 'S', source: 'core, former, tape and label over the board: geometry', run: overallHeight },
  W16: { severity: 'M', source: 'common practice', run: marginHeight },
}
