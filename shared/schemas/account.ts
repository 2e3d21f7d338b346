import { z } from 'zod'
import { MAX_PASSWORD_LENGTH } from '../password-rules'
import { emailSchema, newPasswordSchema } from './session'

/** One place where a person is signed in. */
export interface SignedInView {
  id: string
  /** What the browser said it is. */
  userAgent: string
  /** Address of the network it was last seen from. */
  address: string
  /** Name of the workspace it looks at. */
  workspace: string
  /** Whether it is the one that asks. */
  isThis: boolean
  createdAt: string
  /** To the minute. */
  seenAt: string
}

const currentPasswordSchema = z.string().min(1, 'give your present password').max(MAX_PASSWORD_LENGTH)

export const askResetSchema = z.object({ email: emailSchema })
export type AskReset = z.infer<typeof askResetSchema>

/** A link for a new password that an owner made, to be handed on. */
export interface MadeReset {
  link: string
}

/** Whose password a link changes. */
export interface ResetView {
  name: string
  email: string
}

export const resetSchema = z.object({ password: newPasswordSchema })

export const changePasswordSchema = z.object({ current: currentPasswordSchema, password: newPasswordSchema })
export type ChangePassword = z.infer<typeof changePasswordSchema>

export const changeAddressSchema = z.object({ email: emailSchema, current: currentPasswordSchema })
export type ChangeAddress = z.infer<typeof changeAddressSchema>

/** What the link for another address confirms. */
export interface AddressView {
  email: string
  before: string
}
