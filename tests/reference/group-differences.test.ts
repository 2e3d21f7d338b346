import { describe, expect, it } from 'vitest'
import { adjustedForSeveral, chiSquaredTail, gaugeDifferences } from '../../server/statistics/gauge-differences'
import { gaugeTable } from '../../shared/engine/readout/gauge-table'
import { homogeneity, rankStatistic } from '../../shared/engine/readout/group-differences'

describe('chi-squared', () => {
  // Upper percentage points, as in Abramowitz & Stegun, Handbook of Mathematical Functions (1964), table 26.8, and NIST's
  // e-Handbook, 1.3.6.7.4. Digits from memory.
  it.each([
    [1, 0.05, 3.841],
    [1, 0.01, 6.635],
    [2, 0.05, 5.991],
    [5, 0.05, 11.07],
    [10, 0.05, 18.307],
    [10, 0.01, 23.209],
    [20, 0.05, 31.41],
    [30, 0.1, 40.256],
    [100, 0.05, 124.342],
  ])('with %i degrees of freedom exceeds with chance %d the tabulated %d', (degrees, chance, point) => {
    expect(chiSquaredTail(point, degrees) / chance).toBeCloseTo(1, 3)
  })

  // Closed forms: one degree is a squared normal variable, two an exponential one.
  it('agrees with its closed forms', () => {
    for (const x of [0.1, 1, 4, 9, 25]) expect(chiSquaredTail(x, 2) / Math.exp(-x / 2)).toBeCloseTo(1, 8)
    expect(chiSquaredTail(1.959964 ** 2, 1)).toBeCloseTo(0.05, 7)
  })

  // Fisher, The Design of Experiments, and Yates, Suppl. JRSS 1:217 (1934), on hereditary crime: of 13 monozygotic twins 10
  // were convicted too, of 17 dizygotic ones 2. The uncorrected statistic is 13.03 (from memory).
  it('finds the published statistic of convicted twins', () => {
    expect(homogeneity([10, 2], [13, 17])!.statistic).toBeCloseTo(13.03, 2)
  })
})

describe('Kruskal and Wallis', () => {
  // Kruskal & Wallis, Use of ranks in one-criterion variance analysis, JASA 47:583 (1952), example of three machines that make
  // bottle caps: H = 5.656, and 0.059 by chi-squared.
  it('finds the published H of three machines', () => {
    const machines = [
      [340, 345, 330, 342, 338],
      [339, 333, 344],
      [347, 343, 349, 355],
    ]
    const values = Float64Array.from(machines.flat())
    const machine = machines.flatMap((list, g) => list.map(() => g))
    const found = rankStatistic(values, new Uint32Array(12).fill(1), machine, 3)!
    expect(found.statistic).toBeCloseTo(5.656, 3)
    expect(found).toMatchObject({ degrees: 2, isReliable: false })
    expect(chiSquaredTail(found.statistic, 2)).toBeCloseTo(0.059, 3)
  })
})

describe('Holm', () => {
  // Worked by hand: 0.01·4, 0.02·3, then max(0.06, 0.03·2), then max(0.06, 0.04).
  it('adjusts step by step', () => {
    const adjusted = adjustedForSeveral([0.04, 0.01, 0.03, 0.02])
    expect(adjusted.map((p) => Number(p.toFixed(12)))).toEqual([0.06, 0.04, 0.06, 0.06])
    expect(adjustedForSeveral([0.9, 0.8])).toEqual([1, 1])
  })
})

describe('gaugeDifferences', () => {
  const [GAUGES, READS, ROUNDS] = [5, 60, 400]
  /** Park and Miller's generator (1988), beside the product's. */
  let state = 20_261
  const uniform = (): number => (state = (state * 48_271) % 2_147_483_647) / 2_147_483_647

  /** Reads of each gauge: one broken chain or none, an energy of sixteen levels. */
  function smallestP(shift: number): number {
    const rows = GAUGES * READS
    const gauges = Uint32Array.from({ length: rows }, (_, r) => 1 + (r % GAUGES))
    const worse = (r: number): number => (gauges[r] === 1 ? shift : 0)
    const brokenChains = Uint16Array.from({ length: rows }, (_, r) => (uniform() < 0.3 + worse(r) ? 1 : 0))
    const energies = Float64Array.from({ length: rows }, (_, r) => Math.floor(16 * (uniform() + worse(r))))
    const hits = Uint8Array.from(energies, (energy) => (energy < 4 ? 1 : 0))
    const counts = new Uint32Array(rows).fill(1)
    const table = gaugeTable({ gauges, counts, brokenChains, chains: 4, energies, hits })
    const tests = gaugeDifferences(table, energies, counts)
    expect(tests.map(({ of }) => of)).toEqual(['breaks', 'successes', 'energies'])
    return Math.min(...tests.map(({ adjusted }) => adjusted))
  }

  it('raises a false alarm of all three together in at most one round of twenty', () => {
    const alarms = Array.from({ length: ROUNDS }, () => smallestP(0)).filter((p) => p < 0.05).length
    // Three standard deviations of a binomial variable above 5 %; Holm's bound is not reached, for tests hang together.
    expect(alarms / ROUNDS).toBeLessThan(0.05 + 3 * Math.sqrt((0.05 * 0.95) / ROUNDS))
    expect(alarms).toBeGreaterThan(0)
  })

  it('sees a gauge that is worse', () => {
    const seen = Array.from({ length: 40 }, () => smallestP(0.25)).filter((p) => p < 0.01).length
    expect(seen).toBeGreaterThan(36)
  })
})
