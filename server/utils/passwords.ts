import type { Passwords } from '../services/people'

/** scrypt with the sign-in module's parameters. */
export const PASSWORDS: Passwords = {
  hash: (password) => hashPassword(password),
  verify: (hash, password) => verifyPassword(hash, password),
}
