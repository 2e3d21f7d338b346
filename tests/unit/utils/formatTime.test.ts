import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { NO_VALUE, THIN_SPACE } from '../../../utils/format'
import {
  formatDateTime,
  formatDay,
  formatDuration,
  formatElapsed,
  formatFullTime,
  formatLongDate,
  formatMicroseconds,
  splitDuration,
} from '../../../utils/formatTime'

const thin = (text: string) => text.replaceAll('_', THIN_SPACE)

describe('durations', () => {
  it('chooses the SI unit', () => {
    expect(formatDuration(0)).toBe(thin('0_s'))
    expect(formatDuration(72e-6)).toBe(thin('72_µs'))
    expect(formatDuration(0.3296, 4)).toBe(thin('329.6_ms'))
    expect(formatDuration(5e-9)).toBe(thin('5_ns'))
    expect(formatDuration(41.2)).toBe(thin('41.2_s'))
    expect(formatMicroseconds(14_200)).toBe(thin('14.2_ms'))
  })

  it('takes the larger unit when rounding reaches it', () => {
    expect(formatDuration(0.9999)).toBe(thin('1_s'))
    expect(formatDuration(999.6e-6)).toBe(thin('1_ms'))
  })

  it('writes long times in two units at most', () => {
    expect(formatDuration(60)).toBe(thin('1_min'))
    expect(formatDuration(125)).toBe(thin('2_min 5_s'))
    expect(formatDuration(4800)).toBe(thin('1_h 20_min'))
    expect(formatDuration(90_061)).toBe(thin('1_d 1_h'))
  })

  it('keeps one place while it counts', () => {
    expect(formatElapsed(2.4)).toBe(thin('2.4_s'))
    expect(formatElapsed(10)).toBe(thin('10.0_s'))
    expect(formatElapsed(72.9)).toBe(thin('1_min 12_s'))
  })

  it('shows missing and endless times as such', () => {
    expect(formatDuration(null)).toBe(NO_VALUE)
    expect(formatDuration(Infinity)).toBe('∞')
  })

  it('splits value and unit for setting apart', () => {
    expect(splitDuration(0.32)).toEqual({ value: '320', unit: 'ms' })
    expect(splitDuration(-1.5)).toEqual({ value: '−1.5', unit: 's' })
  })
})

describe('dates', () => {
  const instant = '2026-12-03T14:20:59Z'
  const zone = process.env.TZ

  // Far from UTC, so that local time would show.
  beforeAll(() => {
    process.env.TZ = 'Pacific/Auckland'
  })
  afterAll(() => {
    if (zone === undefined) delete process.env.TZ
    else process.env.TZ = zone
  })

  it('writes UTC whatever the zone of the machine', () => {
    expect(formatDateTime(instant)).toBe('3 Dec, 14:20')
    expect(formatDay('2026-12-31T23:59:59Z')).toBe('31 Dec')
    expect(formatDay('2026-12-31T23:59:59-02:00')).toBe('1 Jan')
    expect(formatLongDate(instant)).toBe('3 December 2026')
    expect(formatFullTime('2026-01-05T07:03:00Z')).toBe('5 Jan 2026, 07:03 UTC')
  })

  it('shows what is no date as missing', () => {
    for (const value of [null, undefined, '', 'soon']) {
      expect(formatDateTime(value)).toBe(NO_VALUE)
      expect(formatFullTime(value)).toBe(NO_VALUE)
    }
  })
})
