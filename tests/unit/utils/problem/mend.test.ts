import { describe, expect, it } from 'vitest'
import { decimalCommaLines, mendDecimalCommas } from '../../../../utils/problem/mend'

describe('mendDecimalCommas', () => {
  it('changes the value of the chosen lines only', () => {
    const text = 'a b 6,5\na c 7,5\na;d;-0,25 # guessed\r\nb,c,2'
    expect(mendDecimalCommas(text, [1, 3, 4])).toBe('a b 6.5\na c 7,5\na;d;-0.25 # guessed\r\nb,c,2')
  })

  it('keeps commas that separate', () => {
    expect(mendDecimalCommas('a,b,1,5', [1])).toBe('a,b,1,5')
    expect(mendDecimalCommas('a, b, 1,5', [1])).toBe('a, b, 1,5')
  })
})

describe('decimalCommaLines', () => {
  it('finds the lines that can be mended', () => {
    const lines = [
      { line: 4, text: 'a b 6,5' },
      { line: 5, text: 'a b six' },
      { line: 9, text: 'a\tb\t1,25' },
    ]
    expect(decimalCommaLines(lines)).toEqual([4, 9])
  })
})
