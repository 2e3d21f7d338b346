import { z } from 'zod'
import { textSchema } from './common'

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

/**
 * waiting: to be sent, or tried again; taken: the bridge said yes, its samples are awaited; given up: it is not tried any
 * more; returned: samples came by it; refused: the bridge said that the machine does not run it; ended: samples came by
 * hand.
 */
export type BridgeCallState = 'waiting' | 'taken' | 'given up' | 'returned' | 'refused' | 'ended'

/** One try to send a run sheet. */
export interface BridgeTry {
  at: string
  milliseconds: number
  status: number | null
  /** Why it failed; null where the bridge took it. */
  reason: string | null
}

/** A run sheet on its way to a bridge and back. */
export interface BridgeCallView {
  kind: BridgeKind
  state: BridgeCallState
  /** Newest first. */
  tries: BridgeTry[]
  /** When it is tried next; null when it is not. */
  nextAttemptAt: string | null
  /** Until when samples are taken from the bridge; null before it was sent. */
  tokenExpiresAt: string | null
  /** What the bridge said where the machine does not run it. */
  refusal: string | null
  /** The samples that came by it. */
  returnId: string | null
  /** It may be sent again. */
  isResendable: boolean
}

/** What a run sheet can be issued by. */
export interface SheetBridge {
  kind: BridgeKind
  /** Of the team's own bridge. */
  host: string | null
}

export const refuseRunSchema = z.object({ reason: textSchema(2000).min(1, 'say why') })

/** What is answered to samples that a bridge sent: the same when the same are sent again. */
export interface BridgeReturn {
  id: string
  reads: number
}
