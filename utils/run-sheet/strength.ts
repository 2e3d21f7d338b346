import type { RuleView, Strength } from '#shared/schemas/run-sheets'
import { formatPercent, formatSignificant, NO_VALUE } from '../format'

const DIGITS = 4
/** Closer than this, two strengths are the same number on the page. */
const SAME = 1e-9

/** One strength, or the range over the chains: `12`, `4.594 to 16.01`. */
export function strengthText({ min, max }: { min: number; max: number }): string {
  if (Math.abs(max - min) <= SAME * Math.abs(max)) return formatSignificant(max, DIGITS)
  return `${formatSignificant(min, DIGITS)} to ${formatSignificant(max, DIGITS)}`
}

/** What the value of a strength rule means, for the field beside the rules. */
export const STRENGTH_FIELDS: Record<Strength['rule'], { label: string; unit: string; hint: string }> = {
  fixed: { label: 'Multiple', unit: '× max |J|', hint: 'k = multiple × the largest |J| of the Ising form.' },
  rms: {
    label: 'κ',
    unit: '× r.m.s. √degree',
    hint: 'Neighbours pull on a chain at random: their sum grows with the root of the degree.',
  },
  choi: {
    label: 'Margin',
    unit: '× Choi’s bound',
    hint: 'Above 1 every chain is held in the ground state: sufficient, not necessary.',
  },
  cut: {
    label: 'Margin',
    unit: '× cut bound',
    hint: 'Above 1 no break survives single flips of either side: sufficient, not necessary.',
  },
  manual: {
    label: 'k of every chain',
    unit: 'in units of J',
    hint: 'Chains can have a strength of their own, in the table below.',
  },
}

/** The smallest scaled coefficient over its σ, and which kind it is: `h, 1.2`. */
export function smallestText({ smallest, scale }: Pick<RuleView, 'smallest' | 'scale'>): string {
  if (!smallest) return NO_VALUE
  const { kind, value, sigma } = smallest
  return `${kind === 'field' ? 'h' : 'J'}, ${formatSignificant((scale * Math.abs(value)) / sigma)}`
}

/** A share of coefficients: `4.2 %`; nothing where there are none to count. */
export const shareText = (counted: { under: number; of: number } | null): string =>
  counted && counted.of > 0 ? formatPercent(counted.under / counted.of, { significant: 2 }) : NO_VALUE
