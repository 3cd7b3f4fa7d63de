export interface CommonModeChokeDuty {
  topology: 'common-mode-choke'
  ratedVoltageV: number
  /** Of the line current. */
  lineCurrentA: number
  /** Above √2 times the rms value behind a rectifier with a capacitor. */
  linePeakA: number
  /** 0 for a direct current. */
  lineFrequencyHz: number
  /** Of the converter whose noise is filtered. */
  switchingFrequencyHz: number
  /** Least impedance of one winding against common-mode noise. */
  impedance: { frequencyHz: number; minimumOhm: number }[]
}
