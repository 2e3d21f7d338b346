import type { TokenStanding } from '#shared/schemas/tokens'
import type { MarkKind } from '~/utils/ui/parts'

export const STANDING_MARKS: Record<TokenStanding, MarkKind> = {
  valid: 'passed',
  expired: 'caution',
  'role lost': 'refused',
}

/** The last second of a day (UTC), given as `2027-01-31`; null for no day at all. */
export const endOfDay = (day: string): string | null => (day ? `${day}T23:59:59Z` : null)

/** A day some days after a moment, as `2027-01-31` (UTC). */
export function dayAfter(now: Date, days: number): string {
  const day = new Date(now)
  day.setUTCDate(day.getUTCDate() + days)
  return day.toISOString().slice(0, 10)
}
