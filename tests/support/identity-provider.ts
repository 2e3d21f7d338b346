import { createHash, randomUUID } from 'node:crypto'
import { once } from 'node:events'
import type { IncomingMessage, ServerResponse } from 'node:http'
import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { SignJWT, exportJWK, generateKeyPair } from 'jose'

export const CLIENT = { id: 'espalier', secret: 'a secret of the client' }

/** Who is signed in at the provider, and what is wrong with what it says. */
export interface Visitor {
  sub: string
  email?: string
  email_verified?: unknown
  name?: string
  /** Claims that replace those of the identity token. */
  token?: Record<string, unknown>
  /** Signed by a key that is not among the published ones. */
  forged?: boolean
  /** The person says no. */
  declines?: boolean
  /** Address and name are told at the userinfo endpoint alone. */
  byUserInfo?: boolean
}

export interface IdentityProvider {
  issuer: URL
  /** Who comes next. */
  visitor: Visitor
  /** Goes where a browser is sent. @returns where it is sent back to */
  visit(url: string): Promise<URL>
  close(): Promise<void>
}

interface Grant {
  visitor: Visitor
  query: URLSearchParams
}

async function bodyOf(request: IncomingMessage): Promise<URLSearchParams> {
  const parts: Buffer[] = []
  for await (const part of request) parts.push(part as Buffer)
  return new URLSearchParams(Buffer.concat(parts).toString())
}

const s256 = (text: string): string => createHash('sha256').update(text).digest('base64url')

/** A small identity provider: OpenID Connect with an authorisation code, PKCE and signed identity tokens. */
export async function startIdentityProvider(visitor: Visitor): Promise<IdentityProvider> {
  const [keys, others] = [await generateKeyPair('RS256'), await generateKeyPair('RS256')]
  const jwk = { ...(await exportJWK(keys.publicKey)), kid: 'one', alg: 'RS256', use: 'sig' }
  const grants = new Map<string, Grant>()
  const server = createServer((request, response) => void answer(request, response)).listen(0, '127.0.0.1')
  await once(server, 'listening')
  const issuer = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
  const provider = { issuer: new URL(issuer), visitor, visit, close: () => closed() }

  const closed = async (): Promise<void> => {
    server.close()
    server.closeAllConnections()
  }
  const json = (response: ServerResponse, body: unknown, status = 200): void => {
    response.writeHead(status, { 'content-type': 'application/json' }).end(JSON.stringify(body))
  }

  function authorise(query: URLSearchParams, response: ServerResponse): void {
    const back = new URL(query.get('redirect_uri')!)
    const code = randomUUID()
    grants.set(code, { visitor: provider.visitor, query })
    if (provider.visitor.declines) back.searchParams.set('error', 'access_denied')
    else back.searchParams.set('code', code)
    back.searchParams.set('state', query.get('state')!)
    response.writeHead(302, { location: back.href }).end()
  }

  async function tokens(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const body = await bodyOf(request)
    const code = body.get('code') ?? ''
    const grant = grants.get(code)
    grants.delete(code)
    const basic = Buffer.from(`${CLIENT.id}:${encodeURIComponent(CLIENT.secret).replace(/%20/g, '+')}`).toString(
      'base64',
    )
    const fits =
      request.headers.authorization === `Basic ${basic}` &&
      grant?.query.get('code_challenge') === s256(body.get('code_verifier') ?? '') &&
      grant.query.get('redirect_uri') === body.get('redirect_uri')
    if (!grant || !fits) return json(response, { error: 'invalid_grant' }, 400)
    const { sub, email, email_verified, name, token, forged, byUserInfo } = grant.visitor
    const now = Math.floor(Date.now() / 1000)
    const claims = {
      ...{ iss: issuer, aud: CLIENT.id, sub, iat: now, exp: now + 300, nonce: grant.query.get('nonce') },
      ...(byUserInfo ? {} : { email, email_verified, name }),
      ...token,
    }
    const signed = new SignJWT(claims).setProtectedHeader({ alg: 'RS256', kid: 'one' })
    const idToken = await signed.sign((forged ? others : keys).privateKey)
    json(response, { access_token: sub, token_type: 'Bearer', expires_in: 300, id_token: idToken })
  }

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const { pathname, searchParams } = new URL(request.url!, issuer)
    if (pathname === '/.well-known/openid-configuration')
      return json(response, {
        ...{ issuer, authorization_endpoint: `${issuer}/authorize`, token_endpoint: `${issuer}/token` },
        ...{ jwks_uri: `${issuer}/keys`, userinfo_endpoint: `${issuer}/userinfo`, response_types_supported: ['code'] },
        ...{ subject_types_supported: ['public'], id_token_signing_alg_values_supported: ['RS256'] },
        code_challenge_methods_supported: ['S256'],
      })
    if (pathname === '/keys') return json(response, { keys: [jwk] })
    if (pathname === '/authorize') return authorise(searchParams, response)
    if (pathname === '/token') return tokens(request, response)
    const { sub, email, email_verified, name } = provider.visitor
    json(response, { sub, email, email_verified, name })
  }

  return provider
}

async function visit(url: string): Promise<URL> {
  const response = await fetch(url, { redirect: 'manual' })
  return new URL(response.headers.get('location')!)
}
