import qrcode from 'qrcode-generator'
import type { ModulesShape, PointMm } from './model'

/** Light modules around the code, ISO/IEC 18004. */
export const QUIET_MODULES = 4

/** The package takes one character per byte; ISO/IEC 18004 readers take bytes for UTF-8. */
const utf8Bytes = (text: string): string => encodeURIComponent(text).replace(/%([0-9A-F]{2})/g, (_, hex: string) => String.fromCharCode(parseInt(hex, 16)))

/**
 * The modules of a QR code (ISO/IEC 18004, byte mode, UTF-8, error correction level M: about 15 % of the code may be
 * spoilt), from the top row down, `1` for dark. The smallest version that holds the text is taken.
 *
 * @throws RangeError when the text is longer than the largest version holds (2331 bytes)
 */
export function matrixCode(text: string): string[] {
  const bytes = utf8Bytes(text)
  if (bytes.length > 2331) throw new RangeError(`a code holds up to 2331 bytes, not ${bytes.length}`)
  const code = qrcode(0, 'M')
  code.addData(bytes, 'Byte')
  code.make()
  const size = code.getModuleCount()
  return Array.from({ length: size }, (_, row) => Array.from({ length: size }, (__, column) => (code.isDark(row, column) ? '1' : '0')).join(''))
}

/** A code with its quiet zone inside a square of `sizeMm`, its lower left corner at `corner`. */
export function matrixCodeShape(text: string, [xMm, yMm]: PointMm, sizeMm: number, tag?: string): ModulesShape {
  const rows = matrixCode(text)
  const moduleMm = sizeMm / (rows.length + 2 * QUIET_MODULES)
  return { kind: 'modules', corner: [xMm + QUIET_MODULES * moduleMm, yMm + QUIET_MODULES * moduleMm], moduleMm, rows, ...(tag !== undefined && { tag }) }
}
