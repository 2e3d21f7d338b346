import { describe, expect, it } from 'vitest'
import { createRandom } from '../../../../shared/engine/random'
import type { Random } from '../../../../shared/engine/random'
import { judgeParts, SUSPECT_RULE } from '../../../../shared/engine/readout/suspects'
import type { ReturnParts } from '../../../../shared/engine/readout/suspects'

interface Plan {
  seed: number
  parts?: number
  reads?: number[]
  /** Factor on the rate of some parts. */
  planted?: Record<number, number>
  /** Standard deviation of the logarithm of each part's own rate, drawn anew for every embedding. */
  spread?: number
  /** Returns of one embedding. */
  each?: number
}

/** A part's rate without anything wrong: the harder it is pulled, the oftener it breaks. */
const rateAt = (pull: number): number => 0.4 * Math.exp(3 * (pull - 1.5))

const binomial = (random: Random, n: number, p: number): number => {
  let hits = 0
  for (let k = 0; k < n; k++) if (random.float() < p) hits++
  return hits
}

/** Parts on a square board in chains of ten whose middles are pulled hardest. */
function board({ seed, parts = 144, reads = [600], planted = {}, spread = 0, each = 1 }: Plan) {
  const random = createRandom(seed)
  const own = reads.map(() => Array.from({ length: parts }, () => Math.exp(spread * random.normal())))
  const x = Float64Array.from({ length: parts }, (_, k) => k % 12)
  const y = Float64Array.from({ length: parts }, (_, k) => Math.floor(k / 12))
  const returns = reads.map((count, r): ReturnParts => {
    const embedding = Math.floor(r / each)
    const weak = Array.from({ length: Math.ceil(parts / 10) }, () => 0.7 + 0.6 * random.float())
    const pull = Float32Array.from(
      { length: parts },
      (_, k) => weak[Math.floor(k / 10)]! * (1 - Math.abs((k % 10) - 4.5) / 10),
    )
    const rates = pull.map((p, k) => Math.min(0.9, rateAt(p) * own[embedding]![k]! * (planted[k] ?? 1)))
    return {
      part: Uint32Array.from({ length: parts }, (_, k) => k),
      chain: Uint32Array.from({ length: parts }, (_, k) => Math.floor(k / 10)),
      breaks: Uint32Array.from(rates, (rate) => binomial(random, count, rate)),
      pull,
      reads: count,
      embedding,
    }
  })
  return { x, y, returns }
}

const suspectsOf = (plan: Plan): number[] =>
  judgeParts(board(plan)).parts.flatMap(({ suspect }, part) => (suspect ? [part] : []))

const SEEDS = Array.from({ length: 120 }, (_, k) => k + 1)

describe('judgeParts', () => {
  it('finds a planted bad part before all others', () => {
    let found = 0
    for (const seed of SEEDS.slice(0, 40)) {
      const { parts } = judgeParts(board({ seed, reads: [600, 900], planted: { 77: 4 }, spread: 0.15 }))
      const ranked = parts.map((_, part) => part).sort((a, b) => (parts[a]!.q ?? 2) - (parts[b]!.q ?? 2))
      if (ranked[0] === 77 && parts[77]!.suspect) found++
    }
    expect(found).toBeGreaterThanOrEqual(38)
  })

  it.each([0, 0.3])('accuses in few sets when nothing is planted (parts differ by %d)', (spread) => {
    const accused = SEEDS.filter((seed) => suspectsOf({ seed, spread }).length > 0).length
    // At 1 % of 120 sets 1.2 are expected; seven or more has a chance below one in a thousand.
    expect(accused).toBeLessThan(7)
  })

  it('does not accuse the middles of long weak chains, which break several times as often as their ends', () => {
    const { returns, x, y } = board({ seed: 5, reads: [4000] })
    const rate = (part: number) => returns[0]!.breaks[part]! / returns[0]!.reads
    const ratios = Array.from({ length: 14 }, (_, chain) => rate(10 * chain + 4) / Math.max(0.001, rate(10 * chain)))
    expect(Math.min(...ratios)).toBeGreaterThan(SUSPECT_RULE.leastRatio)
    expect(judgeParts({ x, y, returns }).parts.filter(({ suspect }) => suspect)).toEqual([])
  })

  it('adds up what several returns say: each alone is too little', () => {
    const plan = { seed: 11, planted: { 44: 3 }, reads: [60] }
    expect(suspectsOf(plan)).toEqual([])
    expect(suspectsOf({ ...plan, reads: Array.from({ length: 20 }, () => 60) })).toEqual([44])
  })

  it('takes returns of other embeddings for more than as many returns of one', () => {
    const plan = { planted: { 44: 5 }, spread: 0.6, reads: [500, 500, 500, 500, 500, 500] }
    const found = (each: number) =>
      SEEDS.slice(0, 20).filter((seed) => suspectsOf({ ...plan, seed, each }).includes(44))
    expect(found(1).length).toBeGreaterThan(15)
    expect(found(6).length).toBeLessThan(10)
  })

  it.each([1, 4])('accuses in few sets of eight returns, %d of each embedding', (each) => {
    const reads = new Array<number>(8).fill(300)
    const accused = SEEDS.slice(0, 60).filter((seed) => suspectsOf({ seed, spread: 0.5, reads, each }).length > 0)
    expect(accused.length).toBeLessThan(5)
  })

  it('measures how much parts differ anyway', () => {
    expect(judgeParts(board({ seed: 2, spread: 0 })).spread).toBeLessThan(0.3)
    expect(judgeParts(board({ seed: 2, spread: 0.6, reads: [4000] })).spread).toBeGreaterThan(0.5)
  })

  it('compares with the nearest parts of like pull only, and with nothing where there are too few', () => {
    const x = Float64Array.of(0, 1, 2, 3, 4, 50, 51)
    const pull = Float32Array.of(1, 1, 1, 1, 1, 3, 0.2)
    const given: ReturnParts = {
      part: Uint32Array.from(x.keys()),
      chain: new Uint32Array(7),
      breaks: Uint32Array.of(20, 10, 10, 10, 10, 90, 90),
      pull,
      reads: 100,
      embedding: 0,
    }
    const { parts, tested } = judgeParts({ x, y: new Float64Array(7), returns: [given] })
    expect(parts.map(({ neighbours }) => neighbours)).toEqual([4, 4, 4, 4, 4, 0, 0])
    expect(parts[0]).toMatchObject({ count: 20, total: 100, neighbourRate: 0.1, ratio: 2 })
    expect(parts[5]).toMatchObject({ neighbourRate: null, ratio: null, q: null, suspect: false })
    expect(tested).toBe(5)
  })

  it('leaves out what it is told to, on both sides of the comparison', () => {
    const given = board({ seed: 3 })
    const left = Uint32Array.from({ length: 144 }, (_, k) => (k < 100 ? 1 : 0))
    const { parts, tested } = judgeParts({ ...given, returns: [{ ...given.returns[0]!, left }] })
    expect(tested).toBeLessThanOrEqual(44)
    expect(parts[0]).toMatchObject({ neighbours: 0, q: null })
    expect(parts[0]!.total).toBe(600)
  })
})
