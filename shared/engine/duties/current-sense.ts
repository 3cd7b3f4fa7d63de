export interface CurrentSenseDuty {
  topology: 'current-sense'
  /** `unipolar-pulse`: behind a rectifier and reset between the pulses; the others pass the burden both ways. */
  waveform: 'unipolar-pulse' | 'bipolar-pulse' | 'sine'
  switchingFrequencyHz: number
  /** Peak currents of the primary. */
  nominalCurrentA: number
  maximumCurrentA: number
  /** Longest pulse over the period; at most 0.5 of bipolar pulses, without meaning for a sine. */
  dutyRatio: number
  /** Secondary over primary turns. */
  ratio: number
  burdenOhm: number
  /** In series with the burden; 0 without. */
  rectifierDropV: number
  /** At the secondary, rectifier included; null where nothing resets but the burden. */
  resetVoltageV: number | null
  /** Direct component of the primary of a transformer that passes both ways. */
  directCurrentA: number
  /** Permitted fall of the reading over the longest pulse, 0…1. */
  permittedDroop: number
  /** Permitted magnetising current over the transformed one, 0…1. */
  permittedError: number
}
