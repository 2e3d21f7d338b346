import type { AuditKind } from '#shared/audit'
import type { AuditEntryView } from '#shared/schemas/audit'

const FOLDERS: Partial<Record<AuditKind, string>> = {
  problem: 'problems',
  embedding: 'embeddings',
  'run sheet': 'run-sheets',
  samples: 'returns',
  machine: 'machines',
}

/** The page of what an entry is about; null for what has none. What was deleted since leads nowhere. */
export function pathOfThing({ kind, thing }: Pick<AuditEntryView, 'kind' | 'thing' | 'what'>): string | null {
  const folder = FOLDERS[kind]
  return folder && thing.id ? `/${folder}/${thing.id}` : null
}

/** What comes after the words of the deed: the kind where the label does not say it. */
export function thingText({ kind, thing }: Pick<AuditEntryView, 'kind' | 'thing'>): string {
  if (kind === 'budget' || kind === 'sign-in') return ''
  if ((kind === 'person' || kind === 'workspace') && !thing.label) return ''
  return thing.label || `a ${kind}`
}

/** What it was done with; for signing in, the deed says it. */
export function meansText({ kind, token }: Pick<AuditEntryView, 'kind' | 'token'>): string {
  if (kind === 'sign-in') return ''
  return token ? `token ${token}` : 'signed in'
}
