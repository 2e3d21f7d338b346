import { createHmac, randomBytes } from 'node:crypto'

/** A secret of a bridge. */
export interface BridgeKey {
  /** Names the secret in every signature. */
  id: string
  secret: string
  /** ISO 8601. */
  madeAt: string
  /** From when on nothing is signed with it; null for the newest. */
  endsAt: string | null
}

/** How long calls are signed with the secret before the newest as well. */
const OVERLAP_MS = 24 * 60 * 60 * 1000
const KEY_ID_BYTES = 4
const SECRET_BYTES = 32

/** Makes a new secret; the one before it signs for a day longer, any older one ends. */
export function withNewKey(keys: readonly BridgeKey[], now: Date): BridgeKey[] {
  const made: BridgeKey = {
    id: randomBytes(KEY_ID_BYTES).toString('hex'),
    secret: `espalier_bridge_${randomBytes(SECRET_BYTES).toString('base64url')}`,
    madeAt: now.toISOString(),
    endsAt: null,
  }
  const endsAt = new Date(now.getTime() + OVERLAP_MS).toISOString()
  return [made, ...keys.slice(0, 1).map((key) => ({ ...key, endsAt }))]
}

export const validKeys = (keys: readonly BridgeKey[], now: Date): BridgeKey[] =>
  keys.filter(({ endsAt }) => endsAt === null || new Date(endsAt) > now)

/** HMAC-SHA-256 over the time in seconds, a full stop and the body, hex. */
const signatureOf = ({ secret }: BridgeKey, seconds: number, body: string): string =>
  createHmac('sha256', secret).update(`${seconds}.${body}`).digest('hex')

/** Headers that say when a call was signed, and by which secrets: `id=hex`, apart by commas. */
export function signatureHeaders(keys: readonly BridgeKey[], now: Date, body: string): Record<string, string> {
  const seconds = Math.floor(now.getTime() / 1000)
  const signatures = validKeys(keys, now).map((key) => `${key.id}=${signatureOf(key, seconds, body)}`)
  return { 'espalier-timestamp': String(seconds), 'espalier-signature': signatures.join(', ') }
}
