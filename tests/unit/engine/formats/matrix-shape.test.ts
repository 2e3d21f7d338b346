import { describe, expect, it } from 'vitest'
import { matrixShape } from '../../../../shared/engine/formats/matrix-shape'

const shape = (text: string) => {
  const rows = text.split('/').map((row) => row.split(' ').map((cell) => (cell === '_' ? '' : cell)))
  return matrixShape(
    rows[0]!,
    rows.slice(1).map((row) => row[0]!),
    rows.length,
    rows.at(-1)!.length,
  )
}

describe('matrixShape', () => {
  it.each([
    ['1 2/3 4', 2, false, false],
    ['5', 1, false, false],
    ['a b/1 2/3 4', 2, true, false],
    ['a 1 2/b 3 4', 2, false, true],
    ['_ a b/a 1 2/b 3 4', 2, true, true],
    ['a b/a 1 2/b 3 4', 2, true, true],
    ['_ 0 1/0 1 2/1 3 4', 2, true, true],
    ['_ 9 1/9 1 2/1 3 4', 2, true, true],
    ['Variable 0.5 1/0.5 1 2/1 3 4', 2, true, true],
    ['name a 1/a 1 2/1 3 4', 2, true, true],
    ['_ 0.5/0.5 4', 2, false, false],
    ['_ 7 5/7 1 2/6 3 4', 3, false, false],
    ['_ a/a 5', 1, true, true],
    ['x 2 2/2 1 2/2 3 4', 3, false, false],
  ])('%s', (text, n, hasHeader, hasLabelColumn) => {
    expect(shape(text)).toEqual({ n, hasHeader, hasLabelColumn })
  })

  it.each(['1 2 3/4 5 6', '0 1 2/1 3 4', '0 1/1 2/3 4', '5 2/1 2/3 4', '1 2/3 4/5 6/7 8', 'a b c d/1 2/3 4'])(
    '%s is not square',
    (text) => {
      expect(shape(text)).toBeNull()
    },
  )
})
