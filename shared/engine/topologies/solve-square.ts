/** Solution of a square system by Gauss elimination with pivots; null for a singular matrix. */
export function solveSquare(matrix: readonly (readonly number[])[], right: readonly number[]): number[] | null {
  const size = right.length
  const rows = matrix.map((row, index) => [...row, right[index]!])
  for (let column = 0; column < size; column++) {
    let pivot = column
    for (let row = column + 1; row < size; row++) if (Math.abs(rows[row]![column]!) > Math.abs(rows[pivot]![column]!)) pivot = row
    if (!(Math.abs(rows[pivot]![column]!) > 1e-14)) return null
    ;[rows[column], rows[pivot]] = [rows[pivot]!, rows[column]!]
    for (let row = 0; row < size; row++) {
      if (row === column) continue
      const factor = rows[row]![column]! / rows[column]![column]!
      for (let k = column; k <= size; k++) rows[row]![k]! -= factor * rows[column]![k]!
    }
  }
  return rows.map((row, index) => row[size]! / row[index]!)
}
