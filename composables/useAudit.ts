import type { AuditKind } from '#shared/audit'
import type { AuditView } from '#shared/schemas/audit'

const PER_PAGE = 50

/** By what the trail is filtered; days as `2027-01-31`. */
export interface AuditFilter {
  by?: string
  kind?: AuditKind
  from?: string
  to?: string
}

function searchOf(filter: AuditFilter, more: Record<string, string>): string {
  const given = Object.entries({ ...filter, ...more }).filter(([, value]) => value)
  return `/api/audit?${new URLSearchParams(given as [string, string][])}`
}

export const auditFileHref = (filter: AuditFilter): string => searchOf(filter, { format: 'csv' })

/** Who did what in the workspace, newest first, the first page. */
export const useAudit = (filter: MaybeRefOrGetter<AuditFilter>) =>
  useResource<AuditView>(() => searchOf(toValue(filter), { limit: String(PER_PAGE) }))

/** Further pages of it. */
export const useAuditPages = (filter: MaybeRefOrGetter<AuditFilter>, first: Ref<AuditView | undefined>) =>
  useLaterPages(first, (cursor) => searchOf(toValue(filter), { limit: String(PER_PAGE), cursor }))
