import { notCheckable, known } from '../answer'
import type { Answer } from '../answer'
import type { CoreShape } from '../library'
import { requireNotNegative, requirePositive } from '../require'
import { effectiveParameters, ePairSections, roundLegPairSections, toroidEffectiveParameters } from './effective-parameters'
import type { CoreSection, EHalfDimensions, EffectiveParameters } from './effective-parameters'

/** Quarter circle between two sections of width s and h: mean length π/8·(s + h), two of them in a closed path of a pair. */
const cornerPairMm = (legMm: number, yokeMm: number) => (Math.PI / 4) * (legMm + yokeMm)

/**
 * Sections of an E half closed by a plate of its own length and depth.
 *
 * Source: IEC 60205 (E cores), the second half's legs left out and its yoke replaced by the plate.
 *
 * @throws RangeError when the dimensions do not form an E, or the plate has no thickness
 */
export function eiSections(dimensions: EHalfDimensions, plateMm: number): CoreSection[] {
  requirePositive('plateMm', plateMm)
  const { aMm, bMm, cMm, dMm, eMm, fMm } = dimensions
  const [outerLegs, , centre] = ePairSections(dimensions)
  const outerLegMm = (aMm - eMm) / 2
  const half = (yokeMm: number): CoreSection[] => [
    { lengthMm: (eMm - fMm) / 2, areaMm2: 2 * cMm * yokeMm },
    { lengthMm: cornerPairMm(yokeMm, outerLegMm) / 2, areaMm2: cMm * (yokeMm + outerLegMm) },
    { lengthMm: cornerPairMm(yokeMm, fMm / 2) / 2, areaMm2: cMm * (yokeMm + fMm / 2) },
  ]
  return [{ ...outerLegs!, lengthMm: dMm }, { ...centre!, lengthMm: dMm }, ...half(bMm - dMm), ...half(plateMm)]
}

/** A width, B height of a half, C depth, D window height, E window width. */
export type UHalfDimensions = Omit<EHalfDimensions, 'fMm'>

/**
 * Sections of a pair of U halves with rectangular legs.
 *
 * Source: IEC 60205 (U cores): two legs, two backs and four corners in series.
 *
 * @throws RangeError when the dimensions do not form a U
 */
export function uPairSections({ aMm, bMm, cMm, dMm, eMm }: UHalfDimensions): CoreSection[] {
  for (const [name, value] of Object.entries({ aMm, bMm, cMm, dMm, eMm })) requirePositive(name, value)
  if (!(aMm > eMm)) throw new RangeError(`aMm must exceed eMm: ${aMm}, ${eMm}`)
  if (!(bMm > dMm)) throw new RangeError(`bMm must exceed dMm: ${bMm}, ${dMm}`)
  const legMm = (aMm - eMm) / 2
  const backMm = bMm - dMm
  return [
    { lengthMm: 4 * dMm, areaMm2: cMm * legMm },
    { lengthMm: 2 * eMm, areaMm2: cMm * backMm },
    { lengthMm: 2 * cornerPairMm(legMm, backMm), areaMm2: (cMm * (legMm + backMm)) / 2 },
  ]
}

/**
 * Sections of a pair of E halves whose centre leg is flattened to a thickness below the depth of the outer legs.
 *
 * Source: IEC 60205 (E cores) with the centre leg's own section, its corners at the mean of what meets in them.
 *
 * @throws RangeError when the dimensions do not form such a core
 */
export function flatLegPairSections(dimensions: EHalfDimensions, centreThicknessMm: number): CoreSection[] {
  requirePositive('centreThicknessMm', centreThicknessMm)
  const { bMm, cMm, dMm, fMm } = dimensions
  const [outerLegs, yokes, , outerCorners, centreCorners] = ePairSections(dimensions)
  const centreMm2 = centreThicknessMm * fMm
  return [
    outerLegs!,
    yokes!,
    { lengthMm: 2 * dMm, areaMm2: centreMm2 },
    outerCorners!,
    { lengthMm: centreCorners!.lengthMm, areaMm2: (2 * cMm * (bMm - dMm) + centreMm2) / 2 },
  ]
}

export interface PotHalfDimensions {
  /** Outside diameter. */
  aMm: number
  /** Height of a half. */
  bMm: number
  /** Depth of the window in a half. */
  dMm: number
  /** Inside diameter of the outer ring. */
  eMm: number
  /** Diameter of the centre post. */
  fMm: number
  /** Hole through the post; 0 without. */
  holeMm: number
  /** Width of each of the two slots in the outer ring; 0 without. */
  slotMm: number
}

/**
 * Effective parameters of a pair of pot core halves. The bottom's flux spreads radially, so its part of the core constants is
 * an integral: ∫dr/(2πrh) and ∫dr/(2πrh)².
 *
 * Source: IEC 60205 (pot cores), slots taken off the area of the ring.
 *
 * @throws RangeError when the dimensions do not form a pot
 */
export function potPairParameters({ aMm, bMm, dMm, eMm, fMm, holeMm, slotMm }: PotHalfDimensions): EffectiveParameters {
  for (const [name, value] of Object.entries({ aMm, bMm, dMm, eMm, fMm })) requirePositive(name, value)
  requireNotNegative('holeMm', holeMm)
  requireNotNegative('slotMm', slotMm)
  if (!(aMm > eMm && eMm > fMm && fMm > holeMm)) throw new RangeError(`aMm > eMm > fMm > holeMm must hold: ${aMm}, ${eMm}, ${fMm}, ${holeMm}`)
  if (!(bMm > dMm)) throw new RangeError(`bMm must exceed dMm: ${bMm}, ${dMm}`)
  const [holeR, postR, windowR, outerR] = [holeMm / 2, fMm / 2, eMm / 2, aMm / 2]
  const bottomMm = bMm - dMm
  const ringMm2 = Math.PI * (outerR ** 2 - windowR ** 2) - 2 * slotMm * (outerR - windowR)
  const postMm2 = Math.PI * (postR ** 2 - holeR ** 2)
  const postStepMm = postR - Math.sqrt((holeR ** 2 + postR ** 2) / 2)
  const ringStepMm = Math.sqrt((windowR ** 2 + outerR ** 2) / 2) - windowR
  const sections: CoreSection[] = [
    { lengthMm: 2 * dMm, areaMm2: ringMm2 },
    { lengthMm: 2 * dMm, areaMm2: postMm2 },
    { lengthMm: (Math.PI / 4) * (2 * postStepMm + bottomMm), areaMm2: (Math.PI / 2) * (postR ** 2 - holeR ** 2 + 2 * postR * bottomMm) },
    { lengthMm: (Math.PI / 4) * (2 * ringStepMm + bottomMm), areaMm2: (Math.PI / 2) * (outerR ** 2 - windowR ** 2 + 2 * windowR * bottomMm) },
  ]
  // The radial bottom as a section of equal core constants: l/A = C_1 and l/A² = C_2 of both bottoms in series.
  const c1 = Math.log(windowR / postR) / (Math.PI * bottomMm)
  const c2 = (1 / postR - 1 / windowR) / (2 * Math.PI ** 2 * bottomMm ** 2)
  return effectiveParameters([...sections, { lengthMm: c1 ** 2 / c2, areaMm2: c1 / c2 }])
}

/** Dimensions A to F of a library row, and those that only some shapes have. */
export interface ShapeDimensions {
  a: number | null
  b: number | null
  c: number | null
  d: number | null
  e: number | null
  f: number | null
  /** EI: thickness of the plate. */
  plate?: number | null
  /** EFD: thickness of the flattened centre leg. */
  centreThickness?: number | null
  /** P: hole through the post and width of a slot. */
  hole?: number | null
  slot?: number | null
}

/**
 * Effective parameters of a set from the dimensions of its shape, in mm, mm² and mm³. Shapes whose standard needs more dimensions
 * than a row holds (EP, EQ, PQ, RM) are not checkable, and so is a row with a dimension missing.
 *
 * Source: IEC 60205.
 *
 * @throws RangeError when the dimensions do not form the shape
 */
export function effectiveParametersOfShape(shape: CoreShape, { a, b, c, d, e, f, plate, centreThickness, hole, slot }: ShapeDimensions): Answer<EffectiveParameters> {
  const missing = notCheckable('no-data')
  if (shape === 'toroid') return a === null || b === null || c === null ? missing : known(toroidEffectiveParameters({ outerDiameterMm: a, innerDiameterMm: b, heightMm: c }))
  if (a === null || b === null || d === null || e === null) return missing
  if (shape === 'P') return f === null ? missing : known(potPairParameters({ aMm: a, bMm: b, dMm: d, eMm: e, fMm: f, holeMm: hole ?? 0, slotMm: slot ?? 0 }))
  if (c === null) return missing
  if (shape === 'U') return known(effectiveParameters(uPairSections({ aMm: a, bMm: b, cMm: c, dMm: d, eMm: e })))
  if (f === null) return missing
  const half: EHalfDimensions = { aMm: a, bMm: b, cMm: c, dMm: d, eMm: e, fMm: f }
  switch (shape) {
    case 'E':
    case 'E-planar':
      return known(effectiveParameters(ePairSections(half)))
    case 'EI':
      return plate == null ? missing : known(effectiveParameters(eiSections(half, plate)))
    case 'EFD':
      return centreThickness == null ? missing : known(effectiveParameters(flatLegPairSections(half, centreThickness)))
    case 'ETD':
    case 'ER':
      return known(effectiveParameters(roundLegPairSections(half)))
    case 'EP':
    case 'EQ':
    case 'PQ':
    case 'RM':
    case 'other':
      return notCheckable('table-not-held')
  }
}
