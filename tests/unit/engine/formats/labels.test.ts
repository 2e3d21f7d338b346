import { describe, expect, it } from 'vitest'
import {
  checkLabels,
  isNumericOrder,
  labelClashes,
  labelFault,
  numericRanks,
  quoteLabel,
} from '../../../../shared/engine/formats/labels'

describe('labelFault', () => {
  it.each([
    ['', 'a label is empty'],
    ['  ', 'a label is empty'],
    ['a\nb', 'a label holds a control character'],
    ['a\0', 'a label holds a control character'],
    ['\ud800', 'a label holds half of a character'],
    ['x'.repeat(201), 'a label is longer than 200 characters'],
  ])('%j', (label, fault) => expect(labelFault(label)).toBe(fault))

  it('finds nothing wrong with ordinary labels', () => {
    for (const label of ['x1', '0', 'north berth', 'Kai 3 – Süd', '船', '⛴️', 'x'.repeat(200)])
      expect(labelFault(label)).toBeNull()
  })
})

describe('labelClashes', () => {
  it.each([
    ['1', '01', 'are the same number written differently'],
    ['1', '1.0', 'are the same number written differently'],
    ['+7', '7', 'are the same number written differently'],
    ['0', '-0', 'are the same number written differently'],
    ['a', 'A', 'differ only in upper and lower case'],
    ['a', ' a', 'differ only in white space'],
    ['a b', 'a  b', 'differ only in white space'],
    ['é', 'e\u0301', 'look the same but are encoded differently (Unicode normalisation)'],
    ['É', 'e\u0301 ', 'differ only in case, white space or Unicode normalisation'],
    ['x', 'x', 'are the same'],
  ])('%j and %j', (first, second, how) => {
    expect(labelClashes(['other', first, 'another', second], [1, 4, 6, 9])).toEqual([
      {
        line: 9,
        message: `the labels "${first}" (line 4) and "${second}" (line 9) ${how}: give each variable one label`,
      },
    ])
  })

  it('lets different labels be', () => {
    expect(labelClashes(['1', '10', '1a', 'x²', 'x2', 'a b', 'ab', '-1'], [1, 2, 3, 4, 5, 6, 7, 8])).toEqual([])
    expect(labelClashes(['12345678901234567890', '12345678901234567891'], [1, 2])).toEqual([])
  })

  it('shows the first 20', () => {
    const labels = Array.from({ length: 60 }, (_, i) => '0'.repeat(i % 14) + '1')
    expect(labelClashes(labels, [...labels.keys()])).toHaveLength(20)
  })
})

describe('numericRanks', () => {
  it('orders integers, negative ones too, and only integers', () => {
    expect(numericRanks(['10', '2', '-3'])).toEqual(Uint32Array.from([2, 1, 0]))
    expect(numericRanks(['10', '2', 'x'])).toBeNull()
    expect(numericRanks(['1.5', '2'])).toBeNull()
    expect(isNumericOrder(['1', '2', '10'])).toBe(true)
    expect(isNumericOrder(['2', '1'])).toBe(false)
    expect(isNumericOrder(['b', 'a'])).toBe(true)
  })
})

describe('quoteLabel and checkLabels', () => {
  it('quotes only where needed', () => {
    expect(quoteLabel('x1')).toBe('x1')
    expect(quoteLabel('a "b", c')).toBe('"a ""b"", c"')
    expect(quoteLabel('#1')).toBe('"#1"')
  })

  it('refuses labels that would not come back', () => {
    expect(() => checkLabels(['a'], 2)).toThrow('1 labels for 2 variables')
    expect(() => checkLabels(['a\n'], 1)).toThrow('control character')
    expect(() => checkLabels(['a', 'A'], 2)).toThrow(RangeError)
    expect(() => checkLabels(['a', 'b'], 2)).not.toThrow()
  })
})
