import { describe, expect, it } from 'vitest'
import {
  formatBytes,
  formatCount,
  formatFingerprint,
  formatInterval,
  formatNumber,
  formatPercent,
  formatPercentInterval,
  formatSignificant,
  MINUS,
  NO_VALUE,
  THIN_SPACE,
} from '../../../utils/format'

const thin = (text: string) => text.replaceAll('_', THIN_SPACE)

describe('formatNumber', () => {
  it('writes a true minus and thin spaces between thousands', () => {
    expect(formatNumber(-196)).toBe(`${MINUS}196`)
    expect(formatNumber(4313)).toBe(thin('4_313'))
    expect(formatNumber(-1234567)).toBe(thin(`${MINUS}1_234_567`))
    expect(formatNumber(999)).toBe('999')
  })

  it('keeps six significant digits and no trailing zeros', () => {
    expect(formatNumber(0.1 + 0.2)).toBe('0.3')
    expect(formatNumber(26.5)).toBe('26.5')
    expect(formatNumber(1234.56789)).toBe(thin('1_234.57'))
    expect(formatNumber(999999.9)).toBe(thin('1_000_000'))
  })

  it('keeps whole numbers whole however long', () => {
    expect(formatNumber(123456789)).toBe(thin('123_456_789'))
  })

  it('writes very small and very large numbers with a power of ten', () => {
    expect(formatNumber(0.0000123)).toBe(thin('1.23_×_10⁻⁵'))
    expect(formatNumber(1.5e21)).toBe(thin('1.5_×_10²¹'))
  })

  it('keeps the decimals asked for', () => {
    expect(formatNumber(12, { decimals: 1 })).toBe('12.0')
    expect(formatNumber(12345.678, { decimals: 2 })).toBe(thin('12_345.68'))
  })

  it('has no negative nought', () => {
    expect(formatNumber(-0)).toBe('0')
    expect(formatNumber(-0.001, { decimals: 1 })).toBe('0.0')
  })

  it('writes a plus where asked', () => {
    expect(formatNumber(2, { signed: true })).toBe('+2')
    expect(formatNumber(0, { signed: true })).toBe('0')
  })

  it('shows missing and infinite values as such', () => {
    for (const missing of [null, undefined, Number.NaN]) expect(formatNumber(missing)).toBe(NO_VALUE)
    expect(formatNumber(-Infinity)).toBe(`${MINUS}∞`)
  })

  it('rounds to significant digits, also across a power of ten', () => {
    expect(formatSignificant(0.0833333, 2)).toBe('0.083')
    expect(formatSignificant(9.996, 3)).toBe('10')
    expect(formatSignificant(0.99951, 3)).toBe('1')
    expect(formatSignificant(4603.2, 2)).toBe(thin('4_600'))
  })

  it('reads back as the same number over many sizes', () => {
    for (let exponent = -3; exponent < 6; exponent += 1) {
      for (const mantissa of [1, 1.5, 2.25, -3.125, 9.75]) {
        const value = mantissa * 10 ** exponent
        const read = Number(formatNumber(value).replaceAll(THIN_SPACE, '').replace(MINUS, '-'))
        expect(Math.abs(read - value)).toBeLessThan(1e-9 * Math.abs(value))
      }
    }
  })
})

describe('formatPercent and intervals', () => {
  it('writes fractions as per cent', () => {
    expect(formatPercent(0.857)).toBe(thin('85.7_%'))
    expect(formatPercent(0.001, { decimals: 2 })).toBe(thin('0.10_%'))
    expect(formatPercent(null)).toBe(NO_VALUE)
  })

  it('joins the ends of an interval by a dash, and by "to" where one is negative', () => {
    expect(formatInterval(12, 17)).toBe('12–17')
    expect(formatInterval(-4, 4)).toBe(`${MINUS}4 to 4`)
    expect(formatInterval(0.5, 1.8, { decimals: 1 })).toBe('0.5–1.8')
    expect(formatInterval(1, null)).toBe(NO_VALUE)
    expect(formatInterval(1, Infinity)).toBe('1–∞')
    expect(formatInterval(5.98, 9.31, { significant: 2 })).toBe('6.0–9.3')
    expect(formatInterval(0.0177, 0.564, { significant: 2 })).toBe('0.02–0.56')
    expect(formatInterval(99.23, 100)).toBe('99.2–100.0')
    expect(formatInterval(393.4, 2150.3)).toBe(thin('393–2_150'))
    expect(formatInterval(0, 0)).toBe('0–0')
    expect(formatPercentInterval(0.834, 0.877)).toBe('83.4–87.7')
  })
})

describe('formatCount, formatBytes, formatFingerprint', () => {
  it('agrees in number', () => {
    expect(formatCount(0, 'read')).toBe('no reads')
    expect(formatCount(1, 'read')).toBe('1 read')
    expect(formatCount(1000, 'read')).toBe(thin('1_000 reads'))
    expect(formatCount(2, 'entry', 'entries')).toBe('2 entries')
  })

  it('uses decimal units', () => {
    expect(formatBytes(0)).toBe(thin('0_B'))
    expect(formatBytes(999)).toBe(thin('999_B'))
    expect(formatBytes(1000)).toBe(thin('1_kB'))
    expect(formatBytes(999_999)).toBe(thin('1_MB'))
    expect(formatBytes(1_234_567)).toBe(thin('1.23_MB'))
  })

  it('groups a fingerprint by four', () => {
    expect(formatFingerprint('9c41e07d5d18')).toBe('9c41 e07d')
    expect(formatFingerprint('9c41e07d5d18', 3)).toBe('9c41 e07d 5d18')
    expect(formatFingerprint('')).toBe('')
  })
})
