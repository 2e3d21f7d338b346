import type { AuditKind } from '../audit'
import type { Page, Person } from './common'

/** Something that happened to a problem or a run sheet, or to what stands on it. */
export interface ActivityItem {
  id: string
  at: string
  /** Null where the bridge of the machine did it, or where nobody is known any more. */
  by: Person | null
  /** The reviewer in whose place it was decided. */
  for: Person | null
  /** The token that was used, where that is known. */
  token: string | null
  /** What was done, after the name of who did it. */
  what: string
  kind: AuditKind
  /** What it was done to; `isGone` where that was deleted since. */
  thing: { id: string; label: string; isGone: boolean }
  /** Figures and names beside it, ready to be read. */
  detail: string | null
}

export type ActivityView = Page<ActivityItem>
