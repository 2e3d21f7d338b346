import { z } from 'zod'
import { MAX_PASSWORD_LENGTH } from '../password-rules'
import type { BudgetBalance } from './budget'
import type { Person, Role } from './common'
import { idSchema, lineSchema } from './common'

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .max(254)
  .pipe(z.email('write an e-mail address such as name@example.org'))

/** Its rules are checked together with whose it is. */
export const newPasswordSchema = z.string().min(1, 'give a password').max(MAX_PASSWORD_LENGTH)

export const signInSchema = z.object({
  email: emailSchema,
  password: z.string().min(1, 'give the password').max(MAX_PASSWORD_LENGTH),
})

/** First account of a new installation; the code is printed on the server's console. */
export const setupSchema = z.object({
  code: z.string().trim().min(1, 'copy the code from the server’s console').max(40),
  workspace: lineSchema(80).min(1, 'give the workspace a name'),
  name: lineSchema(80).min(1, 'give your name'),
  email: emailSchema,
  password: newPasswordSchema,
})

export const foundWorkspaceSchema = z.object({ name: lineSchema(80).min(1, 'give the workspace a name') })

export const goToWorkspaceSchema = z.object({ workspaceId: idSchema })

export interface SessionView {
  person: { id: string; name: string; email: string }
  /** `deletesAt`: when it is deleted for good, where that was asked for. */
  workspace: { id: string; name: string; deletesAt: string | null }
  /** All that the person belongs to, by name. */
  workspaces: { id: string; name: string }[]
  roles: Role[]
  /** Reviewers who are away, in whose place the person reviews now. */
  reviewsFor: Person[]
  counts: { problems: number; machines: number; runSheets: number; people: number }
  /** Items of news in the workspace that the person has not read. */
  unread: number
  /** Machine time of the workspace; null where no budget is kept. */
  budget: BudgetBalance | null
}

/** What the sign-in page needs to know before anyone is signed in. */
export interface EntranceView {
  setupNeeded: boolean
  demo: boolean
  /** Whether it has a mail server: links for a new password go by mail, or come from an owner. */
  sendsMail: boolean
  workspace: string | null
  /** Name of the outside identity provider; null where there is none. */
  provider: string | null
}

export interface MemberView {
  id: string
  name: string
  email: string
  roles: Role[]
  since: string
}
