import type { BoundaryEnd, InsulationBoundary, Side } from '../specification'
import { differenceOfWaveforms, steadyLike } from '../waveforms/combine'
import { mean, meanSquare, maximum, minimum } from '../waveforms/statistics'
import type { Waveform } from '../waveforms/waveform'
import type { Context } from './context'
import type { CornerState } from './corner-result'
import { windingsAt } from './insulation-paths'

/** The potential of one end of a winding over a period, against the return of its own side. */
export interface Node {
  windingId: string
  potentialV: Waveform
  /** Added to the highest value: the turn-off spike of the switched node. */
  spikeV: number
}

export interface BoundaryVoltage {
  rmsV: number
  recurringPeakV: number
}

/** Potentials of both ends of each winding that is part of the circuit. */
export const nodesOf = (corner: CornerState): Node[] =>
  [...corner.ends].flatMap(([windingId, { start, finish, startSpikeV, finishSpikeV }]) => [
    { windingId, potentialV: start, spikeV: startSpikeV },
    { windingId, potentialV: finish, spikeV: finishSpikeV },
  ])

/** A corner with its nodes, made once for all boundaries. */
export interface VoltageCorner {
  corner: CornerState
  nodes: readonly Node[]
}

export const voltageCorner = (corner: CornerState): VoltageCorner => ({ corner, nodes: nodesOf(corner) })

export interface VoltageCorners {
  /** Corners in which the recurring peak is looked for. */
  peak: readonly VoltageCorner[]
  /** Corners in which the rms value is taken: at the rated mains voltage where there is one. */
  rms: readonly VoltageCorner[]
  /** The primary's return follows the mains: half the time it lies at earth, half the time the input rail does. */
  onMains: boolean
}

/**
 * Working voltage between the two ends of a boundary: the greatest of all pairs of nodes. Behind a bridge rectifier
 * the mains lies in turn on either rail, so that the primary's potentials stand for half the time as they are and for
 * half the time lower by the input voltage, against the earthed secondary.
 *
 * Source: IEC 60664-1:2020, 3.1; bridge rectifier on an earthed supply system.
 */
export function boundaryVoltage(context: Context, boundary: InsulationBoundary, corners: VoltageCorners): BoundaryVoltage | null {
  const at = (corner: VoltageCorner) => pairsOf(context, boundary, corner, corners.onMains)
  const rmsV = corners.rms.flatMap((corner) => at(corner).map(pairRms))
  const recurringPeakV = corners.peak.flatMap((corner) => at(corner).map(pairPeak))
  if (rmsV.length === 0 || recurringPeakV.length === 0) return null
  return { rmsV: Math.max(...rmsV), recurringPeakV: Math.max(...recurringPeakV) }
}

interface Pair {
  differenceV: Waveform
  /** Spike of the one node upward, and of the other, which drives the difference down. */
  upSpikeV: number
  downSpikeV: number
  /** Offset that the primary side has for half of the mains period. */
  offsetV: number
}

function pairsOf(context: Context, boundary: InsulationBoundary, { corner, nodes }: VoltageCorner, onMains: boolean): Pair[] {
  const one = nodesAt(context, boundary.between[0], nodes)
  const other = nodesAt(context, boundary.between[1], nodes)
  return one.flatMap((a) =>
    other
      .filter((b) => b.node.windingId !== a.node.windingId)
      .map((b): Pair => {
        const offsetV = onMains && (a.side === 'primary') !== (b.side === 'primary') ? (a.side === 'primary' ? -1 : 1) * corner.result.inputV : 0
        return { differenceV: differenceOfWaveforms(a.node.potentialV, b.node.potentialV), upSpikeV: a.node.spikeV, downSpikeV: b.node.spikeV, offsetV }
      }),
  )
}

function nodesAt(context: Context, end: BoundaryEnd, nodes: readonly Node[]): { node: Node; side: Side }[] {
  if (end.kind === 'core') {
    const side = context.specification.core.potential.value?.side ?? 'floating'
    return coreNodes(context, side, nodes).map((node) => ({ node: { ...node, windingId: 'core' }, side }))
  }
  const windings = windingsAt(context.specification, end)
  return nodes.flatMap((one) => {
    const winding = windings.find(({ id }) => id === one.windingId)
    return winding ? [{ node: one, side: winding.side }] : []
  })
}

/**
 * Potentials that the core may take: a floating one follows whatever of its side couples to it, one tied to a pin that
 * of the winding which ends there; which of a winding's two ends is which the document does not say. The return of the
 * side is always among them. Source: ferrite is treated as part of the circuit it is assigned to, practice of certification bodies.
 */
function coreNodes({ specification }: Context, side: Side, nodes: readonly Node[]): Node[] {
  const first = nodes[0]
  if (!first) return []
  const potential = specification.core.potential.value
  const pin = potential?.connection === 'pin' ? potential.pin : null
  const own = specification.windings.filter((winding) => winding.side === side)
  const tied = own.filter(({ startTerminal, finishTerminal }) => pin !== null && (startTerminal === pin || finishTerminal === pin))
  const ids = new Set((tied.length > 0 ? tied : own).map(({ id }) => id))
  return [{ windingId: 'core', potentialV: steadyLike(first.potentialV, 0), spikeV: 0 }, ...nodes.filter(({ windingId }) => ids.has(windingId))]
}

function pairRms({ differenceV, offsetV }: Pair): number {
  const square = meanSquare(differenceV)
  const shifted = square + 2 * offsetV * mean(differenceV) + offsetV ** 2
  return Math.sqrt(Math.max(0, offsetV === 0 ? square : (square + shifted) / 2))
}

function pairPeak({ differenceV, upSpikeV, downSpikeV, offsetV }: Pair): number {
  const high = maximum(differenceV) + upSpikeV
  const low = minimum(differenceV) - downSpikeV
  return Math.max(...[high, high + offsetV, -low, -(low + offsetV)].map(Math.abs))
}
