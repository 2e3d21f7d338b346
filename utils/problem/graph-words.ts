import type { Form } from '#shared/engine/problem/problem'
import { formatCount, formatNumber } from '../format'
import type { CoefficientScale } from './coefficient-scale'

/** How the coefficients of a form are written. */
export const FORM_SYMBOLS: Record<Form, { readonly linear: string; readonly interaction: string }> = {
  qubo: { linear: 'a', interaction: 'b' },
  ising: { linear: 'h', interaction: 'J' },
}

/** The coefficients that a step of a scale holds, such as `−8 to −6`; the smallest step begins at nought. */
export function stepWords({ bounds }: CoefficientScale, step: number): string {
  if (step === 0) return '0'
  const end = bounds[Math.abs(step) - 1]!
  if (bounds.length === 1) return formatNumber(Math.sign(step) * end, { significant: 3, signed: true })
  const start = bounds[Math.abs(step) - 2] ?? 0
  const ends = step < 0 ? [-end, -start] : [start, end]
  return ends.map((value) => formatNumber(value, { significant: 3 })).join(' to ')
}

/** One variable in a sentence, for what is read out. */
export function variableWords(label: string, form: Form, linear: number, partners: number): string {
  const { linear: symbol } = FORM_SYMBOLS[form]
  return `${label}: ${symbol} = ${formatNumber(linear)}, ${formatCount(partners, 'interaction')}`
}
