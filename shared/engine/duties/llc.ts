import type { ConverterOutput } from '../specification'
import type { ConverterDuty, RectifierForm } from './converter'

/** An output of a resonant converter: rectifier and capacitor, no inductor. */
export interface ResonantOutput extends ConverterOutput {
  rectifier: RectifierForm
}

/** Series-resonant half bridge with the transformer's magnetising inductance as the third reactance. */
export interface LlcDuty extends ConverterDuty {
  topology: 'llc'
  outputs: ResonantOutput[]
  /** Inductance in series with the primary, H. */
  resonantInductanceH: number
  resonantCapacitanceF: number
  /** Whether the series inductance is the transformer's own leakage or a choke beside it. */
  resonantInductor: 'leakage' | 'separate'
  /** Range of the controller. */
  minimumFrequencyHz: number
  maximumFrequencyHz: number
  /** Time in which neither switch conducts; null when not known. */
  deadTimeS: number | null
  /** Capacitance of the bridge's switched node, both switches and the winding; null when not known. */
  bridgeCapacitanceF: number | null
}
