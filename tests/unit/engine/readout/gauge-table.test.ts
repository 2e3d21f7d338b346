import { describe, expect, it } from 'vitest'
import { gaugeTable } from '../../../../shared/engine/readout/gauge-table'

const given = {
  gauges: Uint32Array.of(2, 1, 2, 1, 7),
  counts: Uint32Array.of(1, 4, 3, 2, 5),
  brokenChains: [0, 2, 1, 0, 3],
  chains: 6,
  energies: Float64Array.of(-3, -1, -2, -5, NaN),
  hits: Uint8Array.of(0, 0, 0, 1, 0),
}

describe('gaugeTable', () => {
  it('adds up what was read under each gauge, reads by their counts', () => {
    const [one, two, seven] = gaugeTable(given)
    expect(one).toMatchObject({ gauge: 1, reads: 6, readsWithBreak: 4, breaks: 8, chainReads: 36, successes: 2 })
    expect([...one!.rows]).toEqual([1, 3])
    expect(one!.energy!.mean).toBeCloseTo((4 * -1 + 2 * -5) / 6, 12)
    expect(two).toMatchObject({ gauge: 2, reads: 4, readsWithBreak: 3, breaks: 3, chainReads: 24, successes: 0 })
    // −3, −2, −2, −2: mean −2.25, sample variance 0.25.
    expect(two!.energy!.mean).toBeCloseTo(-2.25, 12)
    expect(two!.energy!.standardError).toBeCloseTo(0.25, 12)
    expect(seven).toMatchObject({ gauge: 7, reads: 5, breaks: 15, energy: null, successes: 0 })
  })

  it('knows no successes without a reference', () => {
    expect(gaugeTable({ ...given, hits: null }).map(({ successes }) => successes)).toEqual([null, null, null])
  })
})
