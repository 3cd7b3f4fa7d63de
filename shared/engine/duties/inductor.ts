import type { CurrentLimit, DcSupply } from '../specification'

/** A rectified line without a bulk capacitor, as a power-factor corrector works on. Rms, tolerance included. */
export interface LineSupply {
  kind: 'line'
  minimumV: number
  nominalV: number
  maximumV: number
  lineFrequencyHz: number
}

/** One winding that stores energy. */
export interface InductorDuty {
  topology: 'inductor'
  /** `line-boost`: the boost inductor of a power-factor corrector, over the half-wave of the line. */
  use: 'buck' | 'boost' | 'line-boost'
  /** A line with `line-boost` alone. */
  supply: DcSupply | LineSupply
  outputVoltageV: number
  outputDropV: number
  outputCurrentA: number
  /** 0 leaves light load out. */
  lightLoadCurrentA: number
  switchingFrequencyHz: number
  /** ΔI peak-to-peak over the mean current where the ripple is greatest; of a line boost over the crest's. */
  rippleRatio: number
  efficiency: number
  switchDropV: number
  currentLimit: CurrentLimit | null
}
