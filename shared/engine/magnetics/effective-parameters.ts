import { requirePositive } from '../require'

/** One piece of the magnetic path of the whole set, all parallel legs taken together. */
export interface CoreSection {
  lengthMm: number
  areaMm2: number
}

export interface EffectiveParameters {
  /** Core constant C_1 = Σ l/A. */
  coreConstantC1PerMm: number
  /** Core constant C_2 = Σ l/A². */
  coreConstantC2PerMm3: number
  lengthMm: number
  areaMm2: number
  volumeMm3: number
}

function fromCoreConstants(c1: number, c2: number): EffectiveParameters {
  return { coreConstantC1PerMm: c1, coreConstantC2PerMm3: c2, lengthMm: c1 ** 2 / c2, areaMm2: c1 / c2, volumeMm3: c1 ** 3 / c2 ** 2 }
}

/**
 * Effective parameters from the pieces of the path: l_e = C_1²/C_2, A_e = C_1/C_2, V_e = C_1³/C_2²; in mm, mm², mm³.
 *
 * Source: IEC 60205.
 *
 * @throws RangeError when there is no section or one has no positive length and area
 */
export function effectiveParameters(sections: readonly CoreSection[]): EffectiveParameters {
  if (sections.length === 0) throw new RangeError('sections must hold at least one')
  sections.forEach(({ lengthMm, areaMm2 }, index) => {
    requirePositive(`sections.${index}.lengthMm`, lengthMm)
    requirePositive(`sections.${index}.areaMm2`, areaMm2)
  })
  const c1 = sections.reduce((sum, { lengthMm, areaMm2 }) => sum + lengthMm / areaMm2, 0)
  const c2 = sections.reduce((sum, { lengthMm, areaMm2 }) => sum + lengthMm / areaMm2 ** 2, 0)
  return fromCoreConstants(c1, c2)
}

/** Dimensions of one E half as the standards letter them: A width, B height, C depth, D window height, E window width over the centre leg, F centre leg. */
export interface EHalfDimensions {
  aMm: number
  bMm: number
  cMm: number
  dMm: number
  eMm: number
  fMm: number
}

function checkEHalf({ aMm, bMm, cMm, dMm, eMm, fMm }: EHalfDimensions): void {
  for (const [name, value] of Object.entries({ aMm, bMm, cMm, dMm, eMm, fMm })) requirePositive(name, value)
  if (!(aMm > eMm && eMm > fMm)) throw new RangeError(`aMm > eMm > fMm must hold: ${aMm}, ${eMm}, ${fMm}`)
  if (!(bMm > dMm)) throw new RangeError(`bMm must exceed dMm: ${bMm}, ${dMm}`)
}

/**
 * Sections of a pair of E halves with rectangular legs.
 *
 * Source: IEC 60205 (E cores): outer legs, yokes, centre leg and the two kinds of corners with mean length π/8·(s + h).
 *
 * @throws RangeError when the dimensions do not form an E
 */
export function ePairSections(dimensions: EHalfDimensions): CoreSection[] {
  checkEHalf(dimensions)
  const { aMm, bMm, cMm, dMm, eMm, fMm } = dimensions
  const yokeMm = bMm - dMm
  const outerLegMm = (aMm - eMm) / 2
  return [
    { lengthMm: 2 * dMm, areaMm2: 2 * cMm * outerLegMm },
    { lengthMm: eMm - fMm, areaMm2: 2 * cMm * yokeMm },
    { lengthMm: 2 * dMm, areaMm2: cMm * fMm },
    { lengthMm: (Math.PI / 4) * (yokeMm + outerLegMm), areaMm2: cMm * (yokeMm + outerLegMm) },
    { lengthMm: (Math.PI / 4) * (yokeMm + fMm / 2), areaMm2: cMm * (yokeMm + fMm / 2) },
  ]
}

/**
 * Sections of a pair of halves with a round centre leg and outer legs hollowed to the diameter E (ETD, EER).
 * Corner areas are the mean of what meets in them; the centre leg turns into a square of equal area there.
 *
 * Source: approximation of the method of IEC 60205 for round legs, within 1 % of catalogue
 * values for ETD 34 to ETD 59; for ETD 29 catalogues differ by 2 % among themselves.
 *
 * @throws RangeError when the dimensions do not form such a core, or its depth exceeds the hollow
 */
export function roundLegPairSections(dimensions: EHalfDimensions): CoreSection[] {
  checkEHalf(dimensions)
  const { aMm, bMm, cMm, dMm, eMm, fMm } = dimensions
  if (!(cMm < eMm)) throw new RangeError(`cMm must be below eMm: ${cMm}, ${eMm}`)
  const yokeMm = bMm - dMm
  const halfChordMm = Math.sqrt(eMm ** 2 - cMm ** 2) / 2
  const hollowMm2 = (cMm / 2) * halfChordMm + (eMm ** 2 / 4) * Math.asin(cMm / eMm)
  const outerMm2 = cMm * aMm - 2 * hollowMm2
  const outerLegMm = outerMm2 / (2 * cMm)
  const centreMm2 = (Math.PI / 4) * fMm ** 2
  const halfSquareMm = Math.sqrt(centreMm2) / 2
  const yokeMm2 = 2 * cMm * yokeMm
  return [
    { lengthMm: 2 * dMm, areaMm2: outerMm2 },
    { lengthMm: eMm - fMm, areaMm2: yokeMm2 },
    { lengthMm: 2 * dMm, areaMm2: centreMm2 },
    { lengthMm: (Math.PI / 4) * (yokeMm + outerLegMm), areaMm2: (outerMm2 + yokeMm2) / 2 },
    { lengthMm: (Math.PI / 4) * (yokeMm + halfSquareMm), areaMm2: (yokeMm2 + centreMm2) / 2 },
  ]
}

export interface ToroidDimensions {
  outerDiameterMm: number
  innerDiameterMm: number
  heightMm: number
}

/**
 * Effective parameters of a toroid of rectangular section:
 * C_1 = 2π/(h·ln(OD/ID)), C_2 = 4π·(1/ID − 1/OD)/(h²·ln³(OD/ID)).
 *
 * Source: IEC 60205 (toroids).
 *
 * @throws RangeError unless outer diameter > inner diameter > 0 and the height is positive
 */
export function toroidEffectiveParameters(dimensions: ToroidDimensions): EffectiveParameters {
  const { outerDiameterMm, innerDiameterMm, heightMm } = dimensions
  requirePositive('innerDiameterMm', innerDiameterMm)
  requirePositive('heightMm', heightMm)
  if (!(outerDiameterMm > innerDiameterMm)) throw new RangeError(`outerDiameterMm must exceed innerDiameterMm: ${outerDiameterMm}`)
  const logRatio = Math.log(outerDiameterMm / innerDiameterMm)
  const c1 = (2 * Math.PI) / (heightMm * logRatio)
  const c2 = (4 * Math.PI * (1 / innerDiameterMm - 1 / outerDiameterMm)) / (heightMm ** 2 * logRatio ** 3)
  return fromCoreConstants(c1, c2)
}
