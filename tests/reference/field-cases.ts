import data from './data/field-cases.json'

/** One finite-element case; lengths in metres, places from the face of the centre leg unless the case says otherwise. */
export interface FieldCase {
  id: string
  coords: 'planar' | 'axisymmetric'
  geometry: Record<string, unknown>
  excitation: Record<string, unknown>
  results: Record<string, unknown>
}

export const SOURCE = data.source

export const fieldCases = (pattern: RegExp): FieldCase[] => (data.cases as unknown as FieldCase[]).filter(({ id }) => pattern.test(id))

/** A line of the table that a run prints: own figure, finite elements, ratio. */
export function ratioLine(id: string, own: number, elements: number, tolerance: number): string {
  return `${id.padEnd(46)} own ${own.toPrecision(5).padStart(10)}  elements ${elements.toPrecision(5).padStart(10)}  own/elements ${(own / elements).toFixed(4)}  demanded ±${tolerance * 100} %`
}
