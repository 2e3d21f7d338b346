import { z } from 'zod'
import { MAX_PASSWORD_LENGTH } from '../password-rules'
import type { Role } from './common'
import { lineSchema, roleSchema } from './common'
import { emailSchema } from './session'

/** At least one role; named twice, it counts once. */
export const rolesSchema = z
  .array(roleSchema)
  .min(1, 'choose at least one role')
  .max(20)
  .transform((roles) => [...new Set(roles)])

export const changeRolesSchema = z.object({ roles: rolesSchema })

export const inviteSchema = z.object({ email: emailSchema, roles: rolesSchema })
export type Invite = z.infer<typeof inviteSchema>

/** An invitation that was neither accepted nor withdrawn. */
export interface InvitationView {
  id: string
  email: string
  roles: Role[]
  /** Null once who invited has no account any more. */
  by: string | null
  createdAt: string
  expiresAt: string
  hasExpired: boolean
}

/** Answer to an invitation that was made or renewed. */
export interface MadeInvitation {
  id: string
  /** Address to hand on where this installation sends no mail; null where it does. */
  link: string | null
}

/** What the page behind the link of an invitation shows. */
export interface InvitedView {
  workspace: string
  email: string
  roles: Role[]
  /** Somebody with an account gives the password it has, others a name and a new one. */
  hasAccount: boolean
  expiresAt: string
}

export const acceptSchema = z.object({
  /** Of a new account; not looked at where there is one. */
  name: lineSchema(80).default(''),
  password: z.string().min(1, 'give a password').max(MAX_PASSWORD_LENGTH),
})
export type Accept = z.infer<typeof acceptSchema>

/** The secret of the link that one was sent. */
export const joinSchema = z.object({ secret: z.string().min(1).max(200) })
