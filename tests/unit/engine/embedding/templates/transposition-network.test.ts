import { describe, expect, it } from 'vitest'
import { transpositionColumns } from '../../../../../shared/engine/embedding/templates/transposition-network'

describe('transpositionColumns', () => {
  it('moves every chain by at most one column a row and brings all pairs side by side', () => {
    for (let n = 1; n <= 17; n++) {
      const rows = Math.max(1, n - 1)
      const columns = transpositionColumns(n)
      const at = (chain: number, row: number): number => columns[chain * rows + row]!
      const met = new Set<string>()
      for (let row = 0; row < rows; row++) {
        expect(new Set(Array.from({ length: n }, (_, chain) => at(chain, row))).size).toBe(n)
        for (let a = 0; a < n; a++) {
          if (row > 0) expect(Math.abs(at(a, row) - at(a, row - 1))).toBeLessThanOrEqual(1)
          for (let b = 0; b < a; b++) if (Math.abs(at(a, row) - at(b, row)) === 1) met.add(`${a} ${b}`)
        }
      }
      expect(met.size).toBe((n * (n - 1)) / 2)
    }
  })
})
