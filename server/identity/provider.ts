import {
  AuthorizationResponseError,
  ClientSecretBasic,
  None,
  allowInsecureRequests,
  authorizationCodeGrant,
  buildAuthorizationUrl,
  calculatePKCECodeChallenge,
  discovery,
  enableNonRepudiationChecks,
  fetchUserInfo,
  randomNonce,
  randomPKCECodeVerifier,
} from 'openid-client'
import type { Configuration } from 'openid-client'
import { DomainError } from '../../shared/errors'
import { emailSchema } from '../../shared/schemas/session'
import { lineSchema } from '../../shared/schemas/common'
import type { ProviderSettings } from './settings'
import { isPlain } from './settings'

const TIMEOUT_SECONDS = 10
const SCOPE = 'openid email profile'

/** What has to be kept in the browser, or out of its sight, until the person is back. */
export interface Handshake {
  /** Ties the identity token to what was asked. */
  nonce: string
  /** Ties the exchange of the code to whoever asked (PKCE). */
  verifier: string
}

/** Who somebody is to the provider. */
export interface Who {
  /** The provider's own id of the person. */
  subject: string
  /** Lower case; null where the provider says none, or not that it is verified. */
  email: string | null
  name: string | null
}

/** An outside identity provider, by OpenID Connect with an authorisation code. */
export interface Provider {
  readonly issuer: string
  readonly name: string
  /** Where the browser goes. @param callback where it comes back to */
  begin(callback: string, state: string, handshake: Handshake): Promise<URL>
  /**
   * Who came back.
   * @param returned the callback, with what the provider added to it
   * @throws DomainError unauthenticated, whatever does not fit: state, nonce, audience, signature, time
   */
  finish(returned: URL, state: string, handshake: Handshake): Promise<Who>
}

export const newHandshake = (): Handshake => ({ nonce: randomNonce(), verifier: randomPKCECodeVerifier() })

async function discovered({ issuer, clientId, clientSecret }: ProviderSettings): Promise<Configuration> {
  const authentication = clientSecret === null ? None() : ClientSecretBasic(clientSecret)
  const execute = [enableNonRepudiationChecks, ...(isPlain(issuer) ? [allowInsecureRequests] : [])]
  return discovery(issuer, clientId, undefined, authentication, { execute, timeout: TIMEOUT_SECONDS })
}

function unreachable(name: string, error: unknown): DomainError {
  console.error(`identity provider: ${error instanceof Error ? error.message : String(error)}`)
  return new DomainError('wrong state', 'provider.unreachable', `${name} did not answer. Try again later.`)
}

function refusal(name: string, error: unknown): DomainError {
  if (error instanceof AuthorizationResponseError)
    return new DomainError('unauthenticated', 'provider.declined', `${name} did not sign you in. Try again.`)
  console.error(`identity provider: ${error instanceof Error ? error.message : String(error)}`)
  return new DomainError('unauthenticated', 'provider.refused', `What ${name} answered does not fit. Begin again.`)
}

interface Claims {
  sub: string
  email?: unknown
  email_verified?: unknown
  name?: unknown
}

function whoOf({ sub, email, email_verified: isVerified, name }: Claims): Who {
  const address = isVerified === true ? emailSchema.safeParse(email) : undefined
  const called = lineSchema(80).min(1).safeParse(name)
  return { subject: sub, email: address?.data ?? null, name: called.data ?? null }
}

/** The provider at an issuer; its metadata are fetched when it is first asked for. */
export function createProvider(settings: ProviderSettings): Provider {
  const { name } = settings
  let found: Promise<Configuration> | undefined
  const configuration = (): Promise<Configuration> =>
    (found ??= discovered(settings)).catch((error: unknown) => {
      found = undefined
      throw unreachable(name, error)
    })

  return {
    issuer: settings.issuer.href.replace(/\/$/, ''),
    name,
    async begin(callback, state, { nonce, verifier }) {
      const config = await configuration()
      const challenge = await calculatePKCECodeChallenge(verifier)
      return buildAuthorizationUrl(config, {
        ...{ redirect_uri: callback, scope: SCOPE, state, nonce },
        ...{ code_challenge: challenge, code_challenge_method: 'S256' },
      })
    },
    async finish(returned, state, { nonce, verifier }) {
      const config = await configuration()
      try {
        const tokens = await authorizationCodeGrant(config, returned, {
          ...{ expectedState: state, expectedNonce: nonce, pkceCodeVerifier: verifier, idTokenExpected: true },
        })
        const claims = tokens.claims()!
        if (claims.email !== undefined || !config.serverMetadata().userinfo_endpoint) return whoOf(claims)
        return whoOf(await fetchUserInfo(config, tokens.access_token, claims.sub))
      } catch (error) {
        throw refusal(name, error)
      }
    },
  }
}
