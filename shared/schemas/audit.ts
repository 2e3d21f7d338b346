import { z } from 'zod'
import type { AuditKind } from '../audit'
import { AUDIT_KINDS } from '../audit'
import type { Page, Person } from './common'
import { idSchema, pageQuerySchema } from './common'

const day = z.iso.date('write a day such as 2027-01-31').optional()

export const auditQuerySchema = pageQuerySchema.extend({
  /** Whose deeds. */
  by: idSchema.optional(),
  kind: z.enum(AUDIT_KINDS).optional(),
  /** First and last day, UTC. */
  from: day,
  to: day,
  format: z.enum(['json', 'csv']).default('json'),
})
export type AuditQuery = z.infer<typeof auditQuerySchema>

export interface AuditEntryView {
  id: string
  at: string
  by: Person
  /** The token that was used; null for somebody signed in. */
  token: string | null
  /** Address of the network that the request came from. */
  address: string
  what: string
  kind: AuditKind
  thing: { id: string | null; label: string }
}

export interface AuditView extends Page<AuditEntryView> {
  /** Everybody who did something. */
  people: Person[]
}
