import { z } from 'zod'

/** Where to go on after the provider: a path of the product; the secret of an invitation that is to be accepted. */
export const goToProviderSchema = z.object({
  next: z
    .string()
    .max(2000)
    .regex(/^\/(?!\/)[^\\\s\p{Cc}]*$/u, 'this is no path of the product')
    .default('/'),
  invitation: z.string().min(1).max(100).optional(),
})

/** Where the browser has to go. */
export interface ProviderAddress {
  url: string
}

/** How one stands to the identity provider of this installation. */
export interface IdentityView {
  /** What people know it by; null where there is none. */
  provider: string | null
  /** Null where one’s account is not linked to it. */
  linkedAt: string | null
  /** Whether the account has a password. */
  hasPassword: boolean
}
