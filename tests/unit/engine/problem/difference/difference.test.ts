import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { differenceOf } from '../../../../../shared/engine/problem/difference/difference'
import type { NamedProblem } from '../../../../../shared/engine/problem/difference/match-variables'
import { buildProblem } from './named-problem'

const small = buildProblem({ a: 1, b: -2, c: 0 }, { 'a b': 3, 'b c': -1 }, 5)

describe('the difference of two problems', () => {
  it('is nothing between a problem and itself', () => {
    expect(differenceOf(small, small, 10)).toEqual({
      added: [],
      removed: [],
      renamed: [],
      linearChanged: 0,
      interactionsAdded: 0,
      interactionsRemoved: 0,
      interactionsChanged: 0,
      changes: [],
      offset: { before: 5, after: 5 },
      graph: 'same',
    })
  })

  it('disregards the order of the variables', () => {
    const shuffled = buildProblem({ c: 0, a: 1, b: -2 }, { 'c b': -1, 'a b': 3 }, 5)
    expect(differenceOf(small, shuffled, 10)).toMatchObject({ changes: [], renamed: [], graph: 'same' })
  })

  it('lists what changed, linear coefficients first', () => {
    const later = buildProblem({ a: 1, b: 4, c: 0 }, { 'a b': 3.5, 'a c': 1 }, 6)
    const difference = differenceOf(small, later, 10)
    expect(difference).toMatchObject({
      linearChanged: 1,
      interactionsAdded: 1,
      interactionsRemoved: 1,
      interactionsChanged: 1,
      offset: { before: 5, after: 6 },
      graph: 'changed',
    })
    expect(difference.changes).toEqual([
      { labels: ['b'], before: -2, after: 4 },
      { labels: ['a', 'b'], before: 3, after: 3.5 },
      { labels: ['a', 'c'], before: null, after: 1 },
      { labels: ['b', 'c'], before: -1, after: null },
    ])
    expect(differenceOf(small, later, 2)).toMatchObject({ linearChanged: 1, interactionsRemoved: 1 })
    expect(differenceOf(small, later, 2).changes).toEqual(difference.changes.slice(0, 2))
  })

  it('says that fewer interactions of fewer variables still are among the earlier ones', () => {
    const fewer = buildProblem({ a: 1, b: -2 }, { 'a b': 3 }, 5)
    expect(differenceOf(small, fewer, 10)).toMatchObject({ removed: ['c'], interactionsRemoved: 1, graph: 'fewer' })
    expect(differenceOf(fewer, small, 10)).toMatchObject({ added: ['c'], interactionsAdded: 1, graph: 'changed' })
  })

  it('takes a variable without interactions for a change: it needs a chain', () => {
    const wider = buildProblem({ a: 1, b: -2, c: 0, d: 7 }, { 'a b': 3, 'b c': -1 }, 5)
    expect(differenceOf(small, wider, 10)).toMatchObject({ added: ['d'], graph: 'changed' })
  })

  it('finds renamed variables, neighbours of each other too', () => {
    const later = buildProblem({ x: 1, y: -2, c: 0 }, { 'x y': 3, 'y c': -1 }, 5)
    const expected = {
      renamed: [
        ['a', 'x'],
        ['b', 'y'],
      ],
      added: [],
      removed: [],
      graph: 'same',
    }
    expect(differenceOf(small, later, 10)).toMatchObject(expected)
    const shuffled = buildProblem({ c: 0, y: -2, x: 1 }, { 'x y': 3, 'c y': -1 }, 5)
    expect(differenceOf(small, shuffled, 10)).toMatchObject(expected)
  })

  it('tells twins apart by their place when all else agrees', () => {
    const twins = buildProblem({ a: 1, b: 1, c: 2 }, { 'a c': 4, 'b c': 4 }, 0)
    const later = buildProblem({ p: 1, q: 1, c: 2 }, { 'p c': 4, 'q c': 4 }, 0)
    expect(differenceOf(twins, later, 10).renamed).toEqual([
      ['a', 'p'],
      ['b', 'q'],
    ])
  })

  it('does not take a variable for another whose interactions differ', () => {
    const later = buildProblem({ x: 1, b: -2, c: 0 }, { 'b x': 3.25, 'b c': -1 }, 5)
    expect(differenceOf(small, later, 10)).toMatchObject({ renamed: [], added: ['x'], removed: ['a'] })
  })
})

/** Coefficients by label, as a reader without indices would keep them. */
function byLabel({ labels, problem }: NamedProblem, called = new Map<string, string>()) {
  const name = (i: number) => called.get(labels[i]!) ?? labels[i]!
  const linear = new Map(labels.map((_, i) => [name(i), problem.linear[i]!]))
  const pairs = new Map(
    Array.from(problem.values, (value, k) => [
      [name(problem.rows[k]!), name(problem.cols[k]!)].sort().join(' '),
      value,
    ]),
  )
  return { linear, pairs }
}

/** Problems of up to six variables with coefficients that often coincide, so that guesses are put to the test. */
const problems = fc
  .record({
    labels: fc.uniqueArray(fc.constantFrom(...'abcdefghij'), { minLength: 1, maxLength: 6 }),
    numbers: fc.array(fc.constantFrom(-1, 0, 0.5, 1), { minLength: 21, maxLength: 21 }),
    offset: fc.constantFrom(0, 2),
  })
  .map(({ labels, numbers, offset }) => {
    const linear = Object.fromEntries(labels.map((label, i) => [label, numbers[i]!]))
    const pairs: Record<string, number> = {}
    let next = 6
    labels.forEach((a, i) => labels.slice(i + 1).forEach((b) => (pairs[`${a} ${b}`] = numbers[next++]!)))
    return buildProblem(linear, pairs, offset)
  })

describe('against a comparison by label', () => {
  it('counts and places every change, whatever was renamed', () => {
    fc.assert(
      fc.property(problems, problems, (before, after) => {
        const difference = differenceOf(before, after, 1000)
        const was = byLabel(before, new Map(difference.renamed))
        const is = byLabel(after)
        const gone = [...was.linear.keys()].filter((label) => !is.linear.has(label))
        expect(difference.removed.sort()).toEqual(gone.sort())
        expect(difference.added.sort()).toEqual([...is.linear.keys()].filter((label) => !was.linear.has(label)).sort())
        const kept = [...is.linear.keys()].filter((label) => was.linear.has(label))
        expect(difference.linearChanged).toBe(kept.filter((l) => was.linear.get(l) !== is.linear.get(l)).length)
        const both = [...is.pairs.keys()].filter((pair) => was.pairs.has(pair))
        expect(difference.interactionsAdded).toBe(is.pairs.size - both.length)
        expect(difference.interactionsRemoved).toBe(was.pairs.size - both.length)
        expect(difference.interactionsChanged).toBe(both.filter((p) => was.pairs.get(p) !== is.pairs.get(p)).length)
        for (const { labels, before: b, after: a } of difference.changes) {
          const [from, to] = labels.length === 1 ? [was.linear, is.linear] : [was.pairs, is.pairs]
          const key = [...labels].sort().join(' ')
          expect([from.get(key) ?? null, to.get(key) ?? null]).toEqual([b, a])
        }
      }),
      { numRuns: 500, seed: 1 },
    )
  })

  it('takes only variables for renamed of which everything is the same', () => {
    fc.assert(
      fc.property(problems, problems, (before, after) => {
        const { renamed } = differenceOf(before, after, 0)
        const was = byLabel(before, new Map(renamed))
        const is = byLabel(after)
        for (const [from, to] of renamed) {
          expect(after.labels).not.toContain(from)
          expect(before.labels).not.toContain(to)
          const of = ({ linear, pairs }: typeof is) => [
            linear.get(to),
            Object.fromEntries([...pairs].filter(([pair]) => pair.split(' ').includes(to))),
          ]
          expect(of(was)).toEqual(of(is))
        }
      }),
      { numRuns: 500, seed: 2 },
    )
  })

  it('finds every renamed variable where all coefficients differ, in any order', () => {
    fc.assert(
      fc.property(fc.shuffledSubarray([0, 1, 2, 3, 4, 5, 6, 7], { minLength: 8 }), fc.nat(255), (order, mask) => {
        const old = (i: number) => `v${i}`
        const now = (i: number) => ((mask >> i) & 1 ? `w${i}` : old(i))
        const build = (name: (i: number) => string, places: number[]) => {
          const pairs: Record<string, number> = {}
          for (let i = 0; i < 8; i++) pairs[`${name(i)} ${name((i + 1) % 8)}`] = 1 + i / 8
          return buildProblem(Object.fromEntries(places.map((i) => [name(i), i])), pairs, 0)
        }
        const { renamed, changes } = differenceOf(build(old, [...order.keys()]), build(now, order), 10)
        expect(changes).toEqual([])
        expect(renamed.length).toBe(order.filter((i) => (mask >> i) & 1).length)
        for (const [from, to] of renamed) expect(from.slice(1)).toBe(to.slice(1))
      }),
      { numRuns: 300, seed: 3 },
    )
  })
})
