import { z } from 'zod'
import type { Person, Role } from './common'
import { nameSchema, roleSchema } from './common'

export const createTokenSchema = z.object({
  name: nameSchema,
  /** The one role that it acts in: of those its maker holds. */
  role: roleSchema,
  /** From when on it is worth nothing; left out or null: it stands until it is revoked. */
  expiresAt: z.iso
    .datetime({ offset: true, error: 'write a time such as 2027-01-31T12:00:00Z' })
    .nullable()
    .default(null),
})
export type CreateToken = z.infer<typeof createTokenSchema>

/** Whether a token opens anything: its maker may have lost the role, and gets it to work again with the role. */
export type TokenStanding = 'valid' | 'expired' | 'role lost'

export interface TokenView {
  id: string
  name: string
  role: Role
  /** Whose token it is: what it does is done in their name. */
  by: Person
  standing: TokenStanding
  createdAt: string
  expiresAt: string | null
  /** To the minute; null before its first use. */
  usedAt: string | null
}

/** Answer to the making of a token. */
export interface MadeToken {
  id: string
  /** Shown this once: only its hash is kept. */
  token: string
}
