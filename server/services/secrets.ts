import { createHash, randomBytes } from 'node:crypto'

const SECRET_BYTES = 32

/** What is kept of a secret: SHA-256, hex. The secret is random, so that it needs no salt and no slow hash. */
export const secretHash = (secret: string): string => createHash('sha256').update(secret).digest('hex')

/** The secret of a link or of a token, and what is kept of it. @param prefix what it begins with */
export function newSecret(prefix = ''): { secret: string; tokenHash: string } {
  const secret = prefix + randomBytes(SECRET_BYTES).toString('base64url')
  return { secret, tokenHash: secretHash(secret) }
}
