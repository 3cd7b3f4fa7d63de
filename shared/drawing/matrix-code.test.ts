import jsQR from 'jsqr'
import { describe, expect, it } from 'vitest'
import { matrixCode, matrixCodeShape, QUIET_MODULES } from './matrix-code'

/** What a reader finds in the modules, each three pixels wide, with their quiet zone. */
function read(rows: readonly string[]): string | null {
  const scale = 3
  const size = (rows.length + 2 * QUIET_MODULES) * scale
  const pixels = new Uint8ClampedArray(size * size * 4).fill(255)
  for (let y = 0; y < size; y++) {
    for (let x = 0; x < size; x++) {
      const dark = rows[Math.floor(y / scale) - QUIET_MODULES]?.[Math.floor(x / scale) - QUIET_MODULES] === '1'
      if (dark) pixels.fill(0, (y * size + x) * 4, (y * size + x) * 4 + 3)
    }
  }
  return jsQR(pixels, size, size)?.data ?? null
}

describe('matrixCode', () => {
  it.each(['A', `PART BM-T-4710-01\nREV B\nSHA256 ${'0123456789abcdef'.repeat(4)}`, 'PART Ω-Übertrager µ3\nREV P2\nNOT RELEASED'])('is read back: %s', (text) => {
    expect(read(matrixCode(text))).toBe(text)
  })

  it('takes the smallest version that holds the text', () => {
    expect(matrixCode('A')).toHaveLength(21)
    expect(matrixCode('A'.repeat(14))).toHaveLength(21)
    expect(matrixCode('A'.repeat(15))).toHaveLength(25)
  })

  it('refuses what no version holds', () => {
    expect(() => matrixCode('A'.repeat(2332))).toThrow(RangeError)
  })
})

it('lies with its quiet zone inside its square', () => {
  const { corner, moduleMm, rows } = matrixCodeShape('A', [10, 20], 29)
  expect(moduleMm).toBe(1)
  expect(corner).toEqual([14, 24])
  expect(rows).toHaveLength(21)
})
