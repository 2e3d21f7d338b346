import { CAUTIONS } from './cautions'
import { entry } from './entry'
import { over, times } from './formula'
import { MACHINE_SHEET } from './sources'
import { formatNumber } from '../format'

/** Digits of an amount of money: cents, and more of less than one. */
export const priceText = (amount: number): string =>
  formatNumber(amount, amount >= 1 ? { decimals: 2 } : { significant: 2 })

interface PriceGiven {
  milliseconds: number
  perSecond: number
  currency: string
}

/** What the estimated machine time costs. */
export const priceHelp = {
  machinePrice: entry<PriceGiven>({
    inputs: ({ milliseconds, perSecond, currency }) => [
      { symbol: 'T', name: 'machine time, estimate', value: milliseconds, unit: 'ms' },
      { symbol: 'p', name: 'price of a second', value: perSecond, unit: currency, from: 'machine sheet' },
    ],
    steps: ({ currency }) => [
      { symbol: 'C', name: 'price', unit: currency, expr: over(times('T', 'p'), 1000), show: priceText },
    ],
    sources: () => [MACHINE_SHEET],
    caution: () => `${CAUTIONS.estimate} ${CAUTIONS.sheet}`,
  }),
}
