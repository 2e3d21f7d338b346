import { createHash, createSign, generateKeyPairSync, randomBytes } from 'node:crypto'
import { isoCBOR } from '@simplewebauthn/server/helpers'
import type { NewPasskey, PasskeyChallenge, UsedPasskey } from '../../shared/schemas/passkeys'

const [PRESENT, VERIFIED, HOLDS_KEY] = [0x01, 0x04, 0x40]

/** What may be wrong with an answer. */
export interface Faults {
  origin?: string
  /** Without asking who is there. */
  unverified?: boolean
  /** The counter that it states. */
  counter?: number
  userHandle?: string
}

/** A passkey made and used by plain arithmetic, as devices do it. */
export function authenticator(site: { origin: string; hostname: string }) {
  const { privateKey, publicKey } = generateKeyPairSync('ec', { namedCurve: 'P-256' })
  const id = randomBytes(64).toString('base64url')
  let counter = 0
  let owner = ''

  const clientData = (type: string, { options }: PasskeyChallenge, origin = site.origin): Buffer =>
    Buffer.from(JSON.stringify({ type, challenge: (options as { challenge: string }).challenge, origin }))
  const authenticatorData = (flags: number, count: number): Buffer => {
    const end = Buffer.alloc(5)
    end.writeUInt8(flags, 0)
    end.writeUInt32BE(count, 1)
    return Buffer.concat([createHash('sha256').update(site.hostname).digest(), end])
  }
  const coseKey = (): Uint8Array => {
    const { x, y } = publicKey.export({ format: 'jwk' })
    const part = (text?: string) => new Uint8Array(Buffer.from(text!, 'base64url'))
    return isoCBOR.encode(
      new Map<number, number | Uint8Array>([
        [1, 2],
        [3, -7],
        [-1, 1],
        [-2, part(x)],
        [-3, part(y)],
      ]),
    )
  }
  const bound = (challengeId: string) => ({ challengeId, id, rawId: id, type: 'public-key' as const })

  return {
    id,
    make(asked: PasskeyChallenge, name: string, faults: Faults = {}): NewPasskey {
      const { challengeId, ...credential } = bound(asked.challengeId)
      owner = (asked.options as { user: { id: string } }).user.id
      const key = Buffer.from(id, 'base64url')
      const length = Buffer.alloc(2)
      length.writeUInt16BE(key.length)
      const flags = PRESENT | HOLDS_KEY | (faults.unverified ? 0 : VERIFIED)
      const authData = Buffer.concat([authenticatorData(flags, counter), Buffer.alloc(16), length, key, coseKey()])
      const attestation = isoCBOR.encode(
        new Map<string, unknown>([
          ['fmt', 'none'],
          ['attStmt', new Map()],
          ['authData', new Uint8Array(authData)],
        ]) as never,
      )
      const response = {
        clientDataJSON: clientData('webauthn.create', asked, faults.origin).toString('base64url'),
        attestationObject: Buffer.from(attestation).toString('base64url'),
        transports: ['internal'],
      }
      return { name, challengeId, credential: { ...credential, response } }
    },
    use(asked: PasskeyChallenge, faults: Faults = {}): UsedPasskey {
      const { challengeId, ...credential } = bound(asked.challengeId)
      counter = faults.counter ?? counter + 1
      const data = authenticatorData(PRESENT | (faults.unverified ? 0 : VERIFIED), counter)
      const client = clientData('webauthn.get', asked, faults.origin)
      const signed = Buffer.concat([data, createHash('sha256').update(client).digest()])
      const response = {
        clientDataJSON: client.toString('base64url'),
        authenticatorData: data.toString('base64url'),
        signature: createSign('sha256').update(signed).sign(privateKey).toString('base64url'),
        userHandle: faults.userHandle ?? owner,
      }
      return { challengeId, credential: { ...credential, response } }
    },
  }
}
