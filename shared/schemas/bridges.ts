import { z } from 'zod'

/** own: a program of the team's, at an address; rehearsal: built in, it rehearses what it is sent. */
export const bridgeKindSchema = z.enum(['own', 'rehearsal'])
export type BridgeKind = z.infer<typeof bridgeKindSchema>

/** An address that calls can be sent to: no credentials, which would be kept in clear, and no fragment, which is never sent. */
const isCallable = (text: string): boolean => {
  if (!/^https?:\/\//i.test(text)) return false
  try {
    const { username, password, hash, hostname } = new URL(text)
    return hostname !== '' && username === '' && password === '' && hash === ''
  } catch {
    return false
  }
}

export const saveBridgeSchema = z
  .object({
    kind: bridgeKindSchema,
    /** Of the team's own bridge: https, or http to a private address that this installation allows. */
    url: z
      .string()
      .trim()
      .max(2000, 'at most 2000 characters')
      .refine(isCallable, 'write an address such as https://bridge.example/runs, without a name and password in it')
      .nullable()
      .default(null),
    /** Run sheets can be issued by it. */
    isOn: z.boolean().default(true),
  })
  .refine(({ kind, url }) => kind === 'rehearsal' || url !== null, { path: ['url'], error: 'give the address' })
export type SaveBridge = z.infer<typeof saveBridgeSchema>

/** A secret that calls are signed with, as it is shown after it was made. */
export interface BridgeKeyView {
  /** Names the secret in every signature. */
  id: string
  madeAt: string
  /** When calls are no longer signed with it; null for the newest. */
  endsAt: string | null
}

/** What came of a call that only tries the bridge. */
export interface BridgeTest {
  at: string
  /** It answered with a status from 200 to 299. */
  isAnswered: boolean
  status: number | null
  milliseconds: number
  /** The beginning of what it answered. */
  answer: string
  /** What went wrong; null where nothing did. */
  reason: string | null
}

export interface BridgeView {
  kind: BridgeKind
  url: string | null
  isOn: boolean
  /** Newest first. */
  keys: BridgeKeyView[]
  lastTest: BridgeTest | null
  changedAt: string
}

export interface MachineBridgeView {
  machine: { id: string; name: string }
  /** Null as long as the machine has none. */
  bridge: BridgeView | null
}

/** A secret, shown this once. */
export interface BridgeSecret {
  keyId: string
  secret: string
}

export interface BridgeSaved {
  /** Null where the bridge keeps the one it has, and of the built-in bridge. */
  made: BridgeSecret | null
}
