import { describe, expect, it } from 'vitest'
import { adviceFor } from '../../../../../shared/engine/readout/advice/advise'
import { ADVICE_KINDS, namesOf, RANKS } from '../../../../../shared/engine/readout/advice/item'
import { chainsWith, quiet } from './evidence'

/** Everything at once that can go wrong. */
const everything = {
  ...quiet,
  chains: chainsWith({
    ...Object.fromEntries(Array.from({ length: 20 }, (_, i) => [i, { breaks: 120 }])),
    2: { strength: 0.6, breaks: 200 },
    4: { length: 9, breaks: 300 },
  }),
  scale: { ...quiet.scale, isChosen: true, value: 0.25 },
  precision: { ...quiet.precision, underTwoSigma: 4 },
  gaugeTests: [{ of: 'breaks', adjusted: 0 }],
  success: { target: 'reference' as const, successes: 1, trials: 1000 },
  suspects: { qubits: [9], couplers: [] },
  groups: [{ name: 'a', isBrokenInBest: true, violations: 3, weight: null, sufficient: null }],
  pause: { s: 0.5, gap: 0.1, gapAt: 0.4, kT: 0.3 },
  temperature: { value: 0.6, interval: null, fallAtGreatest: 1, standardError: 0.1 },
}

describe('adviceFor', () => {
  it('has nothing to say of a quiet return, nor of none', () => {
    expect(adviceFor(quiet)).toEqual([])
    expect(adviceFor({ ...everything, reads: 0 })).toEqual([])
  })

  it('names the planted weak chain first, whatever else is wrong', () => {
    const advice = adviceFor(everything)
    expect(advice.map(({ kind }) => kind)).toEqual([
      'raise-named',
      'suspects',
      'raise-all',
      'weak-penalties',
      're-embed',
      'scale',
      'precision',
      'more-gauges',
      'more-reads',
      'pause',
    ])
    expect(advice[0]!.action).toMatchObject({ variables: [2] })
    for (const { evidence } of advice) expect(evidence.length).toBeGreaterThan(0)
  })

  it('ranks every kind, no two alike', () => {
    expect(new Set(ADVICE_KINDS.map((kind) => RANKS[kind])).size).toBe(ADVICE_KINDS.length)
  })
})

describe('namesOf', () => {
  it('joins names as they are read', () => {
    expect(namesOf([])).toBe('')
    expect(namesOf(['a'])).toBe('a')
    expect(namesOf(['a', 'b', 'c'])).toBe('a, b and c')
    expect(namesOf(['a', 'b', 'c', 'd', 'e', 'f', 'g', 'h'])).toBe('a, b, c, d, e, f and 2 more')
  })
})
