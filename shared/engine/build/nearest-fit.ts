import type { SequenceStep, Winding, WindingStep } from '../specification'
import { layOutCoil } from './coil'
import type { BuildWire, Coil, CoilInput } from './types'

/** A wire that could stand in another's place. */
export interface ThinnerWire {
  name: string
  wire: BuildWire
}

export interface NearestFitInput extends CoilInput {
  /** Wires of the same kind as the winding's, the next thinner first. */
  thinnerWires: (winding: Winding) => readonly ThinnerWire[]
}

/** One change of the document that makes the coil fit. */
export interface NearestFit {
  change: 'wire' | 'turns' | 'tape-layers' | 'parallel'
  /** Step of the sequence that shows it, counted from 0. */
  index: number
  windingId: string | null
  from: number | string
  to: number | string
  /** Build with its bulge after the change. */
  buildMm: number
}

interface Trial extends Omit<NearestFit, 'buildMm'> {
  /** How much of the design the change gives up; the least that fits is taken. */
  cost: number
  input: CoilInput
}

/** Sizes below the wire in use that are tried. */
const MOST_SIZES = 3

/** Turns beyond this share are another design, not a change. */
const MOST_TURNS_SHARE = 0.1

const TAPE_COST = 0.04
const INSULATION_COST = 0.4

/**
 * The least single change with which an overfilled coil fits its window, found by laying the coil again with each: a thinner wire
 * in one winding, the turns of a nearly empty last layer, a layer of tape, a wire less in parallel. Weighed by what is given up:
 * the share of copper or of turns, insulation between windings dearest. Null where none of them is enough.
 */
export function nearestFit(input: NearestFitInput, coil: Coil): NearestFit | null {
  const errors = coil.findings.filter(({ severity }) => severity === 'error').length
  const trials = [...wireTrials(input), ...turnsTrials(input, coil), ...tapeTrials(input), ...parallelTrials(input)].sort((a, b) => a.cost - b.cost)
  for (const { input: changed, cost: _cost, ...change } of trials) {
    const tried = layOutCoil(changed)
    if (tried.layout.buildRatio <= 1 && tried.findings.filter(({ severity }) => severity === 'error').length < errors) return { ...change, buildMm: tried.layout.buildMm }
  }
  return null
}

const stepsOf = ({ sequence }: CoilInput) => sequence.flatMap((step, index) => (step.kind === 'winding' ? [{ step, index }] : []))

function wireTrials(input: NearestFitInput): Trial[] {
  return input.windings.flatMap((winding) => {
    const present = input.wireOf(winding)
    const first = stepsOf(input).find(({ step }) => step.windingId === winding.id)
    if (!present || !first) return []
    return input.thinnerWires(winding).slice(0, MOST_SIZES).map(({ name, wire }): Trial => ({
      change: 'wire',
      index: first.index,
      windingId: winding.id,
      from: present.overallMm,
      to: name,
      cost: 1 - Math.min(1, wire.copperAreaMm2 / present.copperAreaMm2),
      input: { ...input, wireOf: (one) => (one.id === winding.id ? wire : input.wireOf(one)) },
    }))
  })
}

/** The turns of a last layer that is nearly empty, left out. */
function turnsTrials(input: NearestFitInput, { placements }: Coil): Trial[] {
  return stepsOf(input).flatMap(({ step, index }): Trial[] => {
    const placed = placements.find((placement) => placement.index === index)
    const rest = placed?.turnsPerLayer[placed.turnsPerLayer.length - 1] ?? 0
    if (!placed || placed.turnsPerLayer.length < 2 || step.layers !== null || rest > MOST_TURNS_SHARE * step.turns) return []
    const to = step.turns - rest
    return [{ change: 'turns', index, windingId: step.windingId, from: step.turns, to, cost: (2 * rest) / step.turns, input: withStep(input, index, { ...step, turns: to }) }]
  })
}

function tapeTrials(input: NearestFitInput): Trial[] {
  return input.sequence.flatMap((step, index): Trial[] => {
    if (step.kind !== 'tape' || step.layers < 2) return []
    const cost = step.purpose === 'interwinding' ? INSULATION_COST : TAPE_COST
    return [{ change: 'tape-layers', index, windingId: null, from: step.layers, to: step.layers - 1, cost, input: withStep(input, index, { ...step, layers: step.layers - 1 }) }]
  })
}

function parallelTrials(input: NearestFitInput): Trial[] {
  return input.windings.flatMap((winding): Trial[] => {
    const { parallel } = winding.wire
    const first = stepsOf(input).find(({ step }) => step.windingId === winding.id)
    if (parallel < 2 || !first) return []
    const changed = { ...winding, wire: { ...winding.wire, parallel: parallel - 1 } }
    return [{ change: 'parallel', index: first.index, windingId: winding.id, from: parallel, to: parallel - 1, cost: 1 / parallel, input: { ...input, windings: input.windings.map((one) => (one.id === winding.id ? changed : one)) } }]
  })
}

const withStep = (input: CoilInput, index: number, step: SequenceStep | WindingStep): CoilInput => ({ ...input, sequence: input.sequence.map((one, place) => (place === index ? step : one)) })
