import { expect, test } from 'vitest'
import { RULE_DEFAULTS, ruleOf } from '../../../../server/services/programming'

const labels = ['constructor', 'toString', 'a']

test('a label that every object answers to still needs a strength of its own', () => {
  expect(() => ruleOf({ rule: 'manual', perChain: { a: 2 } }, labels)).toThrow('needs a value')
})

test('manual strengths are taken by label, the value fills the rest', () => {
  expect(ruleOf({ rule: 'manual', value: 3, perChain: { toString: 2 } }, labels)).toEqual({
    rule: 'manual',
    value: 3,
    perChain: [null, 2, null],
  })
})

test('an unknown variable is named', () => {
  expect(() => ruleOf({ rule: 'manual', value: 1, perChain: { b: 2 } }, labels)).toThrow('no variable b')
})

test('rules without a value take the stated default', () => {
  expect(ruleOf({ rule: 'rms' }, labels)).toEqual({ rule: 'rms', value: RULE_DEFAULTS.rms })
  expect(ruleOf({ rule: 'cut', value: 2 }, labels)).toEqual({ rule: 'cut', value: 2 })
})
