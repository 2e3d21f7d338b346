import { describe, expect, it } from 'vitest'
import { triangleOf } from '../../../../shared/engine/formats/triangle'

describe('triangleOf', () => {
  it.each([
    ['diagonal only', [[0, 0, 1]]],
    [
      'diagonal only',
      [
        [0, 0, 1],
        [0, 1, 0],
      ],
    ],
    [
      'upper',
      [
        [0, 1, 1],
        [1, 1, 5],
        [2, 0, 0],
      ],
    ],
    ['lower', [[2, 1, 1]]],
    [
      'symmetric',
      [
        [0, 1, 3],
        [1, 0, 3],
      ],
    ],
    [
      'symmetric',
      [
        [0, 1, 1],
        [0, 1, 2],
        [1, 0, 3],
        [2, 2, 1],
      ],
    ],
    [
      'both',
      [
        [0, 1, 3],
        [1, 0, 2],
      ],
    ],
    [
      'both',
      [
        [0, 1, 3],
        [2, 0, 3],
      ],
    ],
    [
      'both',
      [
        [0, 1, 3],
        [0, 2, 1],
        [1, 0, 3],
      ],
    ],
  ])('%s', (expected, entries) => {
    const terms = {
      rows: entries.map((e) => e[0]!),
      cols: entries.map((e) => e[1]!),
      values: entries.map((e) => e[2]!),
    }
    expect(triangleOf(3, terms)).toBe(expected)
  })
})
