import type { ComparedField, RunSheetComparison } from '#shared/run-sheet-comparison'
import { formatFingerprint, formatNumber, formatPercent, formatSignificant, NO_VALUE } from '../format'

/** How two compared run sheets are written down. */

const HASH = /^[0-9a-f]{64}$/
const SIGNIFICANT = 5

export function comparedText({ unit }: Pick<ComparedField, 'unit'>, value: ComparedField['a']): string {
  if (value === null) return NO_VALUE
  if (typeof value === 'string') return HASH.test(value) ? formatFingerprint(value) : value
  if (unit === 'share') return formatPercent(value, { significant: 2 })
  return Number.isInteger(value) ? formatNumber(value) : formatSignificant(value, SIGNIFICANT)
}

/** How many fields, checks and strengths differ. */
export const differencesIn = ({ groups, checks, strengths }: RunSheetComparison) => ({
  fields: groups.flatMap(({ fields }) => fields).filter(({ differs }) => differs).length,
  checks: checks.filter(({ differs }) => differs).length,
  strengths: strengths.differing.length,
})
