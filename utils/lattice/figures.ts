/** Figures as the ledger writes them: true minus, no needless decimals. */

const withMinus = (text: string): string => text.replace('-', '−')

/** A share as a percentage without its sign: 63, 6.9, 0.8, 0. */
export function percent(share: number): string {
  const value = 100 * share
  if (value === 0) return '0'
  return value < 9.95 ? value.toFixed(1) : value.toFixed(0)
}

/** A range of shares as percentages: 12–17. */
export const percentRange = (low: number, high: number): string =>
  high >= 0.0995 && low >= 0.0095
    ? `${(100 * low).toFixed(0)}–${(100 * high).toFixed(0)}`
    : `${(100 * Math.max(0, low)).toFixed(1)}–${high >= 0.0995 ? (100 * high).toFixed(0) : (100 * high).toFixed(1)}`

/** A size with so many decimals. */
export const decimal = (value: number, places: number): string => withMinus(value.toFixed(places))

/** Decimals that show chain strengths and bounds: one from 1 on, three significant digits below. */
export const strengthText = (value: number): string =>
  decimal(value, Math.abs(value) >= 1 || value === 0 ? 1 : Math.min(6, 2 - Math.floor(Math.log10(Math.abs(value)))))
