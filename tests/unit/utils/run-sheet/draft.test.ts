import { describe, expect, it } from 'vitest'
import type { RunSheetDraft } from '../../../../utils/run-sheet/draft'
import { readField } from '../../../../utils/run-sheet/draft'

const draft: RunSheetDraft = {
  name: 'First run',
  strength: { rule: 'rms', value: null, perChain: {} },
  fieldSplit: 'even',
  interactionCouplers: 'all',
  chainCouplers: 'all',
  gauges: 1,
  reads: 1000,
  annealMicroseconds: 20,
  schedule: null,
  scale: null,
  seed: 1,
}

describe('readField', () => {
  it('leaves the value out when the rule uses its own', () => {
    expect(readField('strength', draft)).toEqual({ change: { strength: { rule: 'rms' } } })
  })

  it('sends named chains with a manual strength only', () => {
    const perChain = { 'kno.3': 14 }
    const manual = { ...draft, strength: { rule: 'manual' as const, value: 12, perChain } }
    expect(readField('strength', manual)).toEqual({ change: { strength: { rule: 'manual', value: 12, perChain } } })
    const fixed = { ...draft, strength: { rule: 'fixed' as const, value: 2, perChain } }
    expect(readField('strength', fixed)).toEqual({ change: { strength: { rule: 'fixed', value: 2 } } })
  })

  it('takes an empty scale and a straight schedule for what they say', () => {
    expect(readField('scale', draft)).toEqual({ change: { scale: null } })
    expect(readField('scale', { ...draft, scale: 0.25 })).toEqual({ change: { scale: 0.25 } })
    expect(readField('scale', { ...draft, scale: Number.NaN })).toHaveProperty('complaint')
    expect(readField('schedule', draft)).toEqual({ change: { schedule: null } })
    const schedule = [
      { microseconds: 0, s: 0 },
      { microseconds: 5, s: 1 },
    ]
    expect(readField('schedule', { ...draft, schedule })).toEqual({ change: { schedule } })
    const falling = [...schedule, { microseconds: 9, s: 0.5 }]
    expect(readField('schedule', { ...draft, schedule: falling })).toHaveProperty('complaint')
  })

  it.each([null, NaN, 0, 1.5, 100_001])('complains about %s reads', (reads) => {
    expect(readField('reads', { ...draft, reads })).toEqual({ complaint: 'Give a whole number from 1 to 100 000.' })
  })

  it('complains about an empty name', () => {
    expect(readField('name', { ...draft, name: ' ' })).toHaveProperty('complaint')
  })
})
