import { describe, expect, it } from 'vitest'
import type { ChainBreaks } from '../../../../shared/schemas/returns'
import { mainBreakers, worstChains } from '../../../../utils/returns/breaks'

const chain = (label: string, count: number): ChainBreaks => ({
  variable: 0,
  label,
  length: 3,
  strength: 10,
  cutBound: 9,
  cutBoundExact: true,
  cutSplit: { up: 9, down: 12, cut: 1 },
  count,
  total: 100,
  rate: count / 100,
  low: 0,
  high: 1,
})
const chains = [chain('a', 10), chain('b', 0), chain('c', 60), chain('d', 30)]

describe('worstChains', () => {
  it('sorts by rate and leaves out chains that never broke', () => {
    expect(worstChains(chains, 12).map(({ label }) => label)).toEqual(['c', 'd', 'a'])
    expect(worstChains(chains, 1).map(({ label }) => label)).toEqual(['c'])
  })
})

describe('mainBreakers', () => {
  it('names the fewest chains that reach the share', () => {
    expect(mainBreakers(chains, 0.5)).toMatchObject({ chains: [{ label: 'c' }], share: 0.6 })
    expect(mainBreakers(chains, 0.61)).toMatchObject({ chains: [{ label: 'c' }, { label: 'd' }], share: 0.9 })
  })

  it('is null when nothing broke', () => {
    expect(mainBreakers([chain('b', 0)], 0.5)).toBeNull()
  })
})
