import { DomainError } from '../../shared/errors'
import type { App } from '../app'
import type { Handshake, Provider, Who } from '../identity/provider'
import { newHandshake } from '../identity/provider'
import { countAttempt } from './attempts'
import { openChallenge, takeChallenge } from './challenges'
import type { Site } from './passkey-checks'
import { PER_NETWORK } from './sign-in'

/** What the browser keeps, sealed, until it comes back from the provider. */
export interface KeptHandshake {
  state: string
  verifier: string
  /** Path of the page to go on with. */
  next: string
  /** Secret of the invitation that is to be accepted. */
  invitation: string | null
}

/** @throws DomainError wrong state where this installation has no provider */
export function requireProvider(app: App): Provider {
  if (app.provider) return app.provider
  throw new DomainError('wrong state', 'provider.none', 'This server knows no identity provider.')
}

const callbackOf = (site: Site): string => `${site.address}/api/provider/callback`

interface Begun {
  /** Where the browser goes. */
  url: string
  kept: KeptHandshake
}

interface Asked {
  site: Site
  /** Address that the request comes from. */
  network: string
  next: string
  invitation?: string
  /** Whose account the identity is to be linked to; null for signing in. */
  userId: string | null
}

/** Sends somebody to the provider: what they bring back counts once, within five minutes, in the same browser. */
export async function beginHandshake(app: App, { site, network, next, invitation, userId }: Asked): Promise<Begun> {
  const provider = requireProvider(app)
  await countAttempt(app, `provider asked from ${network}`, PER_NETWORK)
  const handshake = newHandshake()
  const state = await openChallenge(app, { purpose: 'provider', userId, challenge: handshake.nonce })
  const url = await provider.begin(callbackOf(site), state, handshake)
  return { url: url.href, kept: { state, verifier: handshake.verifier, next, invitation: invitation ?? null } }
}

/**
 * Who came back from the provider, and whose account it is to be linked to.
 * @param search what the provider added to the address
 * @throws DomainError not acceptable or unauthenticated
 */
export async function finishHandshake(
  app: App,
  site: Site,
  kept: KeptHandshake | null,
  search: string,
): Promise<{ who: Who; userId: string | null }> {
  const provider = requireProvider(app)
  // Taken by the state that came back, which has to be the one that this browser was sent away with.
  const { challenge: nonce, userId } = await takeChallenge(
    app,
    'provider',
    new URLSearchParams(search).get('state') ?? '',
  )
  if (!kept)
    throw new DomainError('unauthenticated', 'provider.browser', 'This was begun in another browser. Begin again.')
  const handshake: Handshake = { nonce, verifier: kept.verifier }
  return { who: await provider.finish(new URL(callbackOf(site) + search), kept.state, handshake), userId }
}
