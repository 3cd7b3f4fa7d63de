import type { TablePoint } from '../interpolate'

export type OvervoltageCategory = 'I' | 'II' | 'III' | 'IV'
export type PollutionDegree = 1 | 2 | 3 | 4

/** Preferred series of rated impulse voltages, V peak (1.2/50 µs). Source: IEC 60664-1:2020, 4.2.3. */
export const PREFERRED_IMPULSE_V = [330, 500, 800, 1500, 2500, 4000, 6000, 8000, 12000] as const

export interface RatedImpulseRow {
  /** Line to neutral, a.c. or d.c., up to and including. */
  lineToNeutralV: number
  directCurrentOnly: boolean
  impulseV: Readonly<Record<OvervoltageCategory, number>>
}

const impulseRow = (lineToNeutralV: number, I: number, II: number, III: number, IV: number, directCurrentOnly = false): RatedImpulseRow => ({
  lineToNeutralV, directCurrentOnly, impulseV: { I, II, III, IV },
})

/** Rated impulse voltage. Source: IEC 60664-1:2020, Table F.1. */
export const RATED_IMPULSE: readonly RatedImpulseRow[] = [
  impulseRow(50, 330, 500, 800, 1500),
  impulseRow(100, 500, 800, 1500, 2500),
  impulseRow(150, 800, 1500, 2500, 4000),
  impulseRow(300, 1500, 2500, 4000, 6000),
  impulseRow(600, 2500, 4000, 6000, 8000),
  impulseRow(1000, 4000, 6000, 8000, 12000),
  impulseRow(1250, 4000, 6000, 8000, 12000, true),
  impulseRow(1500, 6000, 8000, 10000, 15000, true),
]

/** Least clearance of a pollution degree, mm. Source: IEC 60664-1:2020, Table F.2. */
export const POLLUTION_MINIMUM_MM: Readonly<Record<PollutionDegree, number>> = { 1: 0, 2: 0.2, 3: 0.8, 4: 1.6 }

/** Clearance in an inhomogeneous field up to 2000 m, before the minimum of the pollution degree: kV peak, mm. Source: IEC 60664-1:2020, Table F.2, case A. */
export const IMPULSE_CLEARANCE_A: readonly TablePoint[] = [
  [0.33, 0.01], [0.4, 0.02], [0.5, 0.04], [0.6, 0.06], [0.8, 0.1], [1, 0.15], [1.2, 0.25], [1.5, 0.5], [2, 1], [2.5, 1.5], [3, 2], [4, 3],
  [5, 4], [6, 5.5], [8, 8], [10, 11], [12, 14], [15, 18], [20, 25], [25, 33], [30, 40], [40, 60], [50, 75], [60, 90], [80, 130], [100, 170],
]

/** Clearance in a homogeneous field up to 2000 m, rows 1.2 to 20 kV: kV peak, mm. Source: IEC 60664-1:2020, Table F.2, case B. */
export const IMPULSE_CLEARANCE_B: readonly TablePoint[] = [
  [1.2, 0.2], [1.5, 0.3], [2, 0.45], [2.5, 0.6], [3, 0.8], [4, 1.2], [5, 1.5], [6, 2], [8, 3], [10, 3.5], [12, 4.5], [15, 5.5], [20, 8],
]

/** Clearance for steady-state and recurring peak voltages, inhomogeneous field, up to 2000 m: kV peak, mm. Source: IEC 60664-1:2020, Table F.8. */
export const RECURRING_PEAK_CLEARANCE: readonly TablePoint[] = [
  [0.33, 0.01], [0.4, 0.02], [0.5, 0.04], [0.6, 0.06], [0.8, 0.13], [1, 0.26], [1.2, 0.42], [1.5, 0.76], [2, 1.27], [2.5, 1.8], [3, 2.4],
  [4, 3.8], [5, 5.7], [6, 7.9], [8, 11], [10, 15.2],
]

/** Factor on clearances: altitude in m, factor. Source: IEC 60664-1:2020, Table A.2. */
export const ALTITUDE_FACTOR: readonly TablePoint[] = [
  [2000, 1], [3000, 1.14], [4000, 1.29], [5000, 1.48], [6000, 1.7], [7000, 1.95], [8000, 2.25], [9000, 2.62], [10000, 3.02], [15000, 6.67],
  [20000, 14.5],
]

export type CreepageColumn = 'pcb1' | 'pcb2' | 'pd1' | 'pd2-I' | 'pd2-II' | 'pd2-III' | 'pd3-I' | 'pd3-II' | 'pd3-III'

export const CREEPAGE_COLUMNS: readonly CreepageColumn[] = ['pcb1', 'pcb2', 'pd1', 'pd2-I', 'pd2-II', 'pd2-III', 'pd3-I', 'pd3-II', 'pd3-III']

/** Creepage distance by rms voltage: V, then mm in the order of CREEPAGE_COLUMNS; null where the table has no value. Source: IEC 60664-1:2020, Table F.5. */
export const CREEPAGE: readonly (readonly (number | null)[])[] = [
  [10, 0.025, 0.04, 0.08, 0.4, 0.4, 0.4, 1, 1, 1],
  [12.5, 0.025, 0.04, 0.09, 0.42, 0.42, 0.42, 1.05, 1.05, 1.05],
  [16, 0.025, 0.04, 0.1, 0.45, 0.45, 0.45, 1.1, 1.1, 1.1],
  [20, 0.025, 0.04, 0.11, 0.48, 0.48, 0.48, 1.2, 1.2, 1.2],
  [25, 0.025, 0.04, 0.125, 0.5, 0.5, 0.5, 1.25, 1.25, 1.25],
  [32, 0.025, 0.04, 0.14, 0.53, 0.53, 0.53, 1.3, 1.3, 1.3],
  [40, 0.025, 0.04, 0.16, 0.56, 0.8, 1.1, 1.4, 1.6, 1.8],
  [50, 0.025, 0.04, 0.18, 0.6, 0.85, 1.2, 1.5, 1.7, 1.9],
  [63, 0.04, 0.063, 0.2, 0.63, 0.9, 1.25, 1.6, 1.8, 2],
  [80, 0.063, 0.1, 0.22, 0.67, 0.95, 1.3, 1.7, 1.9, 2.1],
  [100, 0.1, 0.16, 0.25, 0.71, 1, 1.4, 1.8, 2, 2.2],
  [125, 0.16, 0.25, 0.28, 0.75, 1.05, 1.5, 1.9, 2.1, 2.4],
  [160, 0.25, 0.4, 0.32, 0.8, 1.1, 1.6, 2, 2.2, 2.5],
  [200, 0.4, 0.63, 0.42, 1, 1.4, 2, 2.5, 2.8, 3.2],
  [250, 0.56, 1, 0.56, 1.25, 1.8, 2.5, 3.2, 3.6, 4],
  [320, 0.75, 1.6, 0.75, 1.6, 2.2, 3.2, 4, 4.5, 5],
  [400, 1, 2, 1, 2, 2.8, 4, 5, 5.6, 6.3],
  [500, 1.3, 2.5, 1.3, 2.5, 3.6, 5, 6.3, 7.1, 8],
  [630, 1.8, 3.2, 1.8, 3.2, 4.5, 6.3, 8, 9, 10],
  [800, 2.4, 4, 2.4, 4, 5.6, 8, 10, 11, 12.5],
  [1000, 3.2, 5, 3.2, 5, 7.1, 10, 12.5, 14, 16],
  [1250, null, null, 4.2, 6.3, 9, 12.5, 16, 18, 20],
  [1600, null, null, 5.6, 8, 11, 16, 20, 22, 25],
  [2000, null, null, 7.5, 10, 14, 20, 25, 28, 32],
  [2500, null, null, 10, 12.5, 18, 25, 32, 36, 40],
  [3200, null, null, 12.5, 16, 22, 32, 40, 45, 50],
  [4000, null, null, 16, 20, 28, 40, 50, 56, 63],
  [5000, null, null, 20, 25, 36, 50, 63, 71, 80],
  [6300, null, null, 25, 32, 45, 63, 80, 90, 100],
  [8000, null, null, 32, 40, 56, 80, 100, 110, 125],
  [10000, null, null, 40, 50, 71, 100, 125, 140, 160],
]

/** Clearance for a peak voltage whose fundamental lies above 30 kHz, pollution degree 2: V peak, basic or supplementary mm, reinforced mm. Source: IEC 62368-1:2018, Table 11. */
export const HIGH_FREQUENCY_CLEARANCE: readonly (readonly [peakV: number, basicMm: number, reinforcedMm: number])[] = [
  [600, 0.07, 0.14], [800, 0.22, 0.44], [1000, 0.6, 1.2], [1200, 1.68, 3.36], [1400, 2.82, 5.64], [1600, 4.8, 9.6], [1800, 8.04, 16.08],
  [2000, 13.2, 26.4],
]

/** Factor on the table above by pollution degree; degree 4 has none. Source: IEC 62368-1:2018, Table 11. */
export const HIGH_FREQUENCY_POLLUTION_FACTOR: Readonly<Record<PollutionDegree, number | null>> = { 1: 0.8, 2: 1, 3: 1.4, 4: null }

/** Frequency above which the high-frequency rules hold, Hz. Source: IEC 60664-4, scope. */
export const HIGH_FREQUENCY_LIMIT_HZ = 30e3
