import { describe, expect, it } from 'vitest'
import type { PresolveSummary, RemovedVariable } from '../../../../shared/schemas/presolve'
import {
  filterRemoved,
  presolveFacts,
  presolveSentence,
  progressWords,
  reasonWords,
  valueWords,
} from '../../../../utils/problem/presolve'

const row = (given: Partial<RemovedVariable>): RemovedVariable => ({
  order: 1,
  label: 'x7',
  rule: 'sign',
  value: null,
  partners: [],
  table: [0],
  quantities: [3, 0, 0],
  ...given,
})

describe('reasons', () => {
  it('name the quantities of each rule, with the sign that decides', () => {
    expect(reasonWords(row({ value: 0 }), 'qubo')).toBe('a + Σ min(0, b) = 3 ≥ 0')
    expect(reasonWords(row({ table: [1], quantities: [-2, 0, 0] }), 'qubo')).toBe('a + Σ max(0, b) = −2 ≤ 0')
    expect(reasonWords(row({ rule: 'isolated', table: [1], quantities: [-4, 0, 0] }), 'qubo')).toBe('a = −4 ≤ 0')
    const same = row({ rule: 'leaf', partners: ['x3'], table: [0, 1], quantities: [1, -2, 0] })
    expect(reasonWords(same, 'qubo')).toBe(
      'Going up changes E by at least 1 ≥ 0 while x3 is at 0, by at most −2 ≤ 0 while it is at 1',
    )
    const opposite = row({ rule: 'follow', partners: ['x3'], table: [1, 0], quantities: [-1, 2, 0] })
    expect(reasonWords(opposite, 'ising')).toBe(
      'Going up changes E by at most −1 ≤ 0 while x3 is at −1, by at least 2 ≥ 0 while it is at +1',
    )
    const fold = row({ rule: 'fold', partners: ['y', 'z'], table: [0, 1, 0, 0], quantities: [1, -2, 3] })
    expect(reasonWords(fold, 'qubo')).toBe('1 exactly where a + b y + c z < 0: a = 1, b = −2 with y, c = 3 with z')
    expect(reasonWords(row({ rule: 'roof weak', quantities: [-5.5, 2, 0] }), 'qubo')).toBe('Round 2, lower bound −5.5')
    expect(reasonWords(row({ rule: 'component', quantities: [7, -3, 0] }), 'qubo')).toBe(
      '7 variables, all states tried, least energy −3',
    )
  })

  it('say the value, or what it follows', () => {
    expect(valueWords(row({ value: -1 }), 'ising')).toBe('−1')
    expect(valueWords(row({ value: 1 }), 'qubo')).toBe('1')
    expect(valueWords(row({ partners: ['x3'], table: [0, 1] }), 'qubo')).toBe('as x3')
    expect(valueWords(row({ partners: ['x3'], table: [1, 0] }), 'qubo')).toBe('opposite of x3')
    expect(valueWords(row({ partners: ['y', 'z'], table: [0, 1, 1, 1] }), 'qubo')).toBe('by y and z')
  })
})

it('variables are found by their label, a partner’s, and the rule', () => {
  const rows = [row({}), row({ label: 'deck', rule: 'leaf', partners: ['X71'] }), row({ label: 'quay', rule: 'leaf' })]
  expect(filterRemoved(rows, { text: ' x7 ', rule: '' })).toEqual(rows.slice(0, 2))
  expect(filterRemoved(rows, { text: '', rule: 'leaf' })).toEqual(rows.slice(1))
})

it('the headline says what was taken out, that nothing was, or the optimum', () => {
  const summary: PresolveSummary = {
    before: { variables: 40, interactions: 90 },
    after: { variables: 12, interactions: 30 },
    byRule: [{ rule: 'sign', count: 28 }],
    rounds: 1,
    bound: -7.5,
    optimum: null,
    isExact: true,
  }
  expect(presolveSentence(summary)).toBe(
    'Pre-solve takes out 28 of 40 variables, without losing the optimum; 30 interactions of 90 are left.',
  )
  expect(presolveFacts(summary, 'min').map(({ label, value }) => [label, value])).toEqual([
    ['Variables', '40 → 12'],
    ['Interactions', '90 → 30'],
    ['Taken out', '28'],
    ['Lower bound', '−7.5'],
  ])
  const solved = { ...summary, after: { variables: 0, interactions: 0 }, optimum: 9 }
  expect(presolveSentence(solved)).toContain('the optimum is 9, proved')
  expect(presolveFacts(solved, 'max')[3]).toMatchObject({ label: 'Optimum', value: '9' })
  expect(presolveSentence({ ...summary, after: summary.before })).toBe(
    'Pre-solve takes no variable out of this problem.',
  )
  expect(progressWords({ state: 'running', phase: 'roof duality', left: 1, round: 2 })).toBe(
    'Roof duality, round 2: 1 variable left',
  )
})
