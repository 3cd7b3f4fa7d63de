import type { LayoutItem } from '../evaluation'
import type { Finding } from '../findings'
import type { MarginStep } from '../specification'
import type { CoilInput, MarginPlacement, ShieldPlacement, StepPlacement, TapePlacement } from './types'

/** One winding space between two flanges, filled from the tube outward. */
export interface Section {
  number: number
  xMm: number
  widthMm: number
  yMm: number
  margin: { step: MarginStep; index: number; bottomMm: number } | null
}

/** The coil as far as it is laid. */
export interface Progress {
  input: CoilInput
  sections: Section[]
  items: LayoutItem[]
  placements: StepPlacement[]
  tapes: TapePlacement[]
  margins: MarginPlacement[]
  shields: ShieldPlacement[]
  findings: Finding[]
  laidTurns: Map<string, number>
  copperAreaMm2: number
  squaresAreaMm2: number
}

export const finding = (code: Finding['code'], severity: Finding['severity'], path: string, values: Finding['values']): Finding => ({ code, severity, path, values })
