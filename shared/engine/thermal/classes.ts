import { known, notCheckable } from '../answer'
import type { Answer } from '../answer'

export type ThermalClassC = 90 | 105 | 120 | 130 | 155 | 180 | 200 | 220 | 250

export interface ThermalClassRow {
  classC: ThermalClassC
  letter: string | null
  /** Winding temperature by resistance in normal operation; null where the table has none. */
  windingLimitC: number | null
  /** Winding temperature under overload; null where the table has none. */
  overloadLimitC: number | null
}

/**
 * Thermal classes and the winding temperatures they allow. Thermocouple readings are limited 10 K lower.
 *
 * Source: classes IEC 60085:2007; winding limits IEC 60950-1 Table C.1, as taken up in IEC 62368-1 G.5.3 (from memory, medium
 * confidence: check the product standard for the ambient reference).
 */
export const THERMAL_CLASSES: readonly ThermalClassRow[] = [
  { classC: 90, letter: 'Y', windingLimitC: null, overloadLimitC: null },
  { classC: 105, letter: 'A', windingLimitC: 100, overloadLimitC: 150 },
  { classC: 120, letter: 'E', windingLimitC: 115, overloadLimitC: 165 },
  { classC: 130, letter: 'B', windingLimitC: 120, overloadLimitC: 175 },
  { classC: 155, letter: 'F', windingLimitC: 140, overloadLimitC: 190 },
  { classC: 180, letter: 'H', windingLimitC: 165, overloadLimitC: 210 },
  { classC: 200, letter: 'N', windingLimitC: null, overloadLimitC: null },
  { classC: 220, letter: 'R', windingLimitC: null, overloadLimitC: null },
  { classC: 250, letter: null, windingLimitC: null, overloadLimitC: null },
]

/** How much lower a thermocouple reading is limited than the temperature by resistance, K. Source: IEC 60950-1 Table C.1 (from memory). */
export const THERMOCOUPLE_DEDUCTION_K = 10

/**
 * Greatest winding temperature of a class by the resistance method, in °C; not checkable where the table has no limit.
 *
 * Source: see `THERMAL_CLASSES`.
 */
export function windingLimitC(classC: ThermalClassC): Answer<number> {
  const limit = THERMAL_CLASSES.find((row) => row.classC === classC)?.windingLimitC
  return limit == null ? notCheckable('no-row-for-input', { classC }) : known(limit)
}

/**
 * Class of an insulation system: that of its weakest member.
 *
 * Source: IEC 60085:2007; UL 1446 asks for the recognised combination besides.
 *
 * @throws RangeError when no member is given
 */
export function systemClassC(memberClassesC: readonly ThermalClassC[]): ThermalClassC {
  if (memberClassesC.length === 0) throw new RangeError('memberClassesC must hold at least one')
  return memberClassesC.reduce((lowest, classC) => (classC < lowest ? classC : lowest))
}
