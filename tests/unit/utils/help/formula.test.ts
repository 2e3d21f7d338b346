import { describe, expect, it } from 'vitest'
import {
  evaluate,
  greatest,
  isTwofold,
  least,
  minus,
  most,
  over,
  plus,
  plusMinus,
  root,
  size,
  square,
  sum,
  symbolsOf,
  times,
} from '../../../../utils/help/formula'
import { spoken, spokenFormula } from '../../../../utils/help/speech'

const values = { a: 3, b: -4, L_k: [1, 2, 5], N_k: [4, 3, 1] }

describe('evaluate', () => {
  it('works out every operation', () => {
    expect(evaluate(minus(plus('a', 'b', 2), 7), values)).toBe(-6)
    expect(evaluate(over(times('a', 'b'), 8), values)).toBe(-1.5)
    expect(evaluate(root(plus(square('a'), square('b'))), values)).toBe(5)
    expect(evaluate(most(size('b'), 'a'), values)).toBe(4)
    expect(evaluate(least('a', 'b'), values)).toBe(-4)
  })

  it('folds lists value by value', () => {
    expect(evaluate(sum('k', times('L_k', 'N_k')), values)).toBe(1 * 4 + 2 * 3 + 5 * 1)
    expect(evaluate(greatest('k', 'L_k'), values)).toBe(5)
  })

  it('gives both ends of ±, in brackets and fractions too', () => {
    const ends = over(plusMinus('a', 1), 2)
    expect(isTwofold(ends)).toBe(true)
    expect(isTwofold(over('a', 2))).toBe(false)
    expect([evaluate(ends, values, -1), evaluate(ends, values, 1)]).toEqual([1, 2])
  })

  it('refuses symbols without a value, and lists that are not folded', () => {
    expect(() => evaluate('x', values)).toThrow('no input for x')
    expect(() => evaluate(plus('L_k', 1), values)).toThrow('L_k is a list')
  })

  it('tells which symbols occur', () => {
    expect(symbolsOf(over(plus('a', times('b', 'a')), root(sum('k', 'N_k'))))).toEqual(['a', 'b', 'N_k'])
  })
})

describe('spoken formulas', () => {
  const names = { n: 'variables', m: 'interactions', d: 'mean degree' }

  it('say the names of the inputs, with brackets where they are needed', () => {
    expect(spokenFormula({ symbol: 'd', expr: over(times(2, 'm'), 'n') }, names)).toBe(
      'mean degree is open bracket 2 times interactions close bracket divided by variables',
    )
    expect(spoken(times('n', minus('n', 1)), names)).toBe(
      'variables times open bracket variables minus 1 close bracket',
    )
    expect(spoken(sum('k', 'n'), names)).toBe('the sum of variables')
    expect(spoken(most('n', 0), names)).toBe('the larger of variables and 0')
  })
})
