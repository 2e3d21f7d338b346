import { describe, expect, it } from 'vitest'
import { formatNumber, isDecimal, numberFault, parseNumber } from '../../../../shared/engine/formats/numbers'
import { createRandom } from '../../../../shared/engine/random'

describe('isDecimal', () => {
  it('agrees with a grammar on every short text over the characters that matter', () => {
    const grammar = /^[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?$/
    const characters = [...'1.e+-Ex ']
    let texts = ['']
    for (let length = 0; length < 5; length++) {
      for (const text of texts) expect(`${text} ${isDecimal(text)}`).toBe(`${text} ${grammar.test(text)}`)
      texts = texts.flatMap((text) => characters.map((character) => text + character))
    }
  })
})

describe('parseNumber', () => {
  it.each([
    ['3', 3],
    ['+3', 3],
    ['-.5', -0.5],
    ['5.', 5],
    ['1e-3', 0.001],
    ['1E+2', 100],
    ['0', 0],
    ['0.00e99999', 0],
  ])('reads %s', (text, value) => expect(parseNumber(text)).toBe(value))

  it.each([
    ['', 'the value is missing'],
    ['NaN', 'the value "NaN" is not a finite number'],
    ['-Infinity', 'the value "-Infinity" is not a finite number'],
    ['inf', 'the value "inf" is not a finite number'],
    ['1e400', 'the value "1e400" is too large'],
    ['-1e151', 'the value "-1e151" is too large'],
    ['1e-400', 'the value "1e-400" is too close to zero'],
    ['0x10', 'the value "0x10" is not a decimal number'],
    ['1_000', 'the value "1_000" is not a decimal number'],
    ['−1', 'the value "−1" is not a decimal number'],
    ['0,5', 'the value "0,5" is not a number; write the decimal mark as a point'],
    ['9'.repeat(60) + 'x', `the value "${'9'.repeat(40)}…" is not a decimal number`],
  ])('refuses %j and says why', (text, reason) => {
    expect(parseNumber(text)).toBeNaN()
    expect(numberFault(text)).toBe(reason)
  })
})

describe('formatNumber', () => {
  it('reads back to the same double', () => {
    const random = createRandom(21)
    for (let trial = 0; trial < 2000; trial++) {
      const value = random.normal() * 10 ** (random.below(200) - 100)
      expect(parseNumber(formatNumber(value))).toBe(value)
    }
    expect(formatNumber(-0)).toBe('0')
    expect(formatNumber(0.1)).toBe('0.1')
  })
})
