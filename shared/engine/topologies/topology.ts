import type { Finding } from '../findings'
import type { ConverterOutput, CurrentLimit, Duty, Side, Supply, Winding } from '../specification'
import type { Waveform } from '../waveforms/waveform'

/** A winding as the circuit sees it. Turns are positive; shields are no part of a circuit. */
export interface CircuitWinding {
  id: string
  name: string
  role: Winding['role']
  side: Side
  outputId: string | null
  turns: number
}

/** What a topology makes its waveforms from. */
export interface CircuitInput<D extends Duty> {
  duty: D
  /** The winding at which the inductance is stated. */
  primary: CircuitWinding
  /** All windings that can carry current, the primary among them, in the order of the document. */
  windings: readonly CircuitWinding[]
  /** Magnetising inductance at the primary, the others open. */
  inductanceH: number
  /** Leakage inductance at a winding with others shorted together, H; null where it is not known. */
  leakageH: (windingId: string, shortedIds: readonly string[]) => number | null
}

/** A doubt about the duty or the windings that serve it; `path` is a dotted path of the document. */
export type CircuitFinding = Finding

export interface Circuit {
  findings: readonly CircuitFinding[]
  /**
   * The periodic steady state at one operating point; null where a winding is missing without which there is none.
   *
   * @throws RangeError on a value out of its range, or where the point cannot be reached
   */
  solve: ((point: OperatingPoint) => CircuitState) | null
}

export interface OperatingPoint {
  /** Direct voltage at the converter, or the voltage that a part without a converter is asked at. */
  inputV: number
  load: 'full' | 'light'
  /** Every load current is multiplied by it; 1 but for the overload of the current limit. */
  loadFactor: number
}

/**
 * Currents are positive into the dotted end, so that all windings' ampere-turns add up to the core's;
 * voltages are at the dotted end against the other end.
 */
export interface WindingWaveforms {
  currentA: Waveform
  voltageV: Waveform
}

/** Potentials of both ends of a winding against the return of its own side; the spike adds to the highest value of its end. */
export interface WindingEnds {
  start: Waveform
  finish: Waveform
  startSpikeV: number
  finishSpikeV: number
}

export type CircuitMode =
  /** The inductor's current (of a converter with filters: that of the main output) stops within the period. */
  | 'discontinuous'
  | 'boundary'
  | 'continuous'
  /** A circuit outside forces the current. */
  | 'forced'
  /** Resonant converters: the frequency against the series resonance. */
  | 'below-resonance'
  | 'at-resonance'
  | 'above-resonance'

/** What one output gets. */
export interface OutputState {
  outputId: string
  /** Voltage at the load, with its sign. */
  voltageV: number
  /** Current behind the rectifier and, where there is one, the filter inductor: what capacitor and load share. */
  rectifiedA: Waveform
  /** Reverse voltage of the rectifier without spike; null where there is none. */
  rectifierPeakV: number | null
  mode: CircuitMode
}

/** One operating point solved: everything later stages take, for any topology. */
export interface CircuitState {
  mode: CircuitMode
  /** Conduction of one switch over the period. */
  dutyRatio: number
  frequencyHz: number
  windings: ReadonlyMap<string, WindingWaveforms>
  ends: ReadonlyMap<string, WindingEnds>
  /** Flux that links one turn, Wb. */
  fluxWb: Waveform
  inputPowerW: number
  /** Voltage across the open switch, clamp spike included; null without a switch. */
  switchPeakV: number | null
  /** Greatest current of one switch, and its rate of rise when it opens; null where no limit acts on it. */
  switchPeakA: number | null
  switchSlopeAPerS: number | null
  outputs: readonly OutputState[]
  /** Time that the current takes to pass between windings at an edge, s; null where edges are ideal. */
  commutationS: number | null
  /** Further figures of this topology alone, by name with their unit. */
  figures: readonly CircuitFigure[]
  findings: readonly CircuitFinding[]
}

/** A figure that only some topologies have, such as the charge for switching at zero voltage. */
export interface CircuitFigure {
  /** Permanent code, translated by the client. */
  code: string
  value: number | null
  unit: string
  formula: string
  source: string
}

/** What of a duty every topology answers alike. */
export interface DutyTraits {
  /** Null where the duty hangs on no supply. */
  supply: Supply | null
  outputs: readonly ConverterOutput[]
  /** Power taken from the supply at full load; null without a supply. */
  inputPowerW: number | null
  efficiency: number | null
  currentLimit: CurrentLimit | null
  frequencyHz: { minimum: number; maximum: number }
  switchRatingV: number | null
}

/** How the figures of a corner came about, for the working. */
export interface CircuitWords {
  source: string
  dutyRatio: (mode: CircuitMode) => string
  switchPeakV: string
  flux: string
  /** Where the frequency is found, not stated. */
  frequency?: string
  commutation?: string
}

/** The names under which operating points appear. */
export type PointName =
  | 'minimum-input'
  | 'nominal-input'
  | 'maximum-input'
  | 'light-load-minimum-input'
  | 'light-load'
  | 'light-load-maximum-input'
  | 'current-limit'

export interface NamedPoint extends OperatingPoint {
  name: PointName
}

/** One topology: a function from duty to waveforms, with what the generic stages must know of it. */
export interface Topology<D extends Duty> {
  /**
   * `stores-energy`: the flux follows the current, saturation is that of the current limit.
   * `unipolar`, `bipolar` and `resonant`: the flux follows the volt-seconds, from remanence or about zero; a bipolar core takes double
   * flux at start, a resonant one does not.
   */
  core: 'stores-energy' | 'unipolar' | 'bipolar' | 'resonant'
  traits: (duty: D) => DutyTraits
  circuit: (input: CircuitInput<D>) => Circuit
  /** Operating points asked; the input range with full and light load where left out. */
  points?: (duty: D) => NamedPoint[]
  /** Ampere-turns of the primary that one ampere of the limited switch current stands for at most, over the turns of the primary. */
  limitWeight?: (duty: D) => number
  /** Transformers: the longest pulse that start or a step can give at the greatest input, at the primary. */
  worstPulse?: (input: Pick<CircuitInput<D>, 'duty' | 'primary' | 'windings'>) => { voltSecondsVs: number; formula: string }
  words: CircuitWords
}
