import { z } from 'zod'
import { MAX_PASSWORD_LENGTH } from '../password-rules'
import type { Page } from './common'
import { lineSchema } from './common'

/** Bytes as browsers write them into JSON. */
const bytesSchema = (characters: number) => z.base64url('this is not base64url').max(characters)

const credential = { id: bytesSchema(1400).min(1), rawId: bytesSchema(1400).min(1), type: z.literal('public-key') }
const challengeIdSchema = z.string().min(1).max(100)

/** A passkey that was used: what `PublicKeyCredential.toJSON()` of the browser says of it. */
export const usedPasskeySchema = z.object({
  /** As it was handed out with what was asked. */
  challengeId: challengeIdSchema,
  credential: z.object({
    ...credential,
    response: z.object({
      clientDataJSON: bytesSchema(4000),
      authenticatorData: bytesSchema(4000),
      signature: bytesSchema(4000),
      userHandle: bytesSchema(200).nullish(),
    }),
  }),
})
export type UsedPasskey = z.infer<typeof usedPasskeySchema>

const passkeyNameSchema = lineSchema(60).min(1, 'give it a name')

/** A passkey that was made, with what the person calls it. */
export const newPasskeySchema = z.object({
  name: passkeyNameSchema,
  challengeId: challengeIdSchema,
  credential: z.object({
    ...credential,
    response: z.object({
      clientDataJSON: bytesSchema(4000),
      attestationObject: bytesSchema(20_000),
      transports: z.array(z.string().max(20)).max(10).default([]),
    }),
  }),
})
export type NewPasskey = z.infer<typeof newPasskeySchema>

export const renamePasskeySchema = z.object({ name: passkeyNameSchema })

/** That it is really this person who asks: their password, or a passkey of theirs. */
export const proofSchema = z.object({
  current: z.string().max(MAX_PASSWORD_LENGTH).optional(),
  passkey: usedPasskeySchema.optional(),
})
export type Proof = z.infer<typeof proofSchema>

/** What a browser is asked for; to be answered once, within five minutes. */
export interface PasskeyChallenge {
  challengeId: string
  /** As `PublicKeyCredential.parseRequestOptionsFromJSON` or `parseCreationOptionsFromJSON` of the browser takes it. */
  options: object
}

export interface PasskeyView {
  id: string
  name: string
  /** Whether its maker keeps copies on other devices of the person. */
  backedUp: boolean
  createdAt: string
  usedAt: string | null
}

/** Passkeys of one's own, oldest first. */
export interface PasskeysView extends Page<PasskeyView> {
  /** Whether the account has a password as well. */
  hasPassword: boolean
}
