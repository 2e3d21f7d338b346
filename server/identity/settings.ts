/** An outside identity provider, from the environment. */
export interface ProviderSettings {
  /** As its metadata name it, such as `https://id.example`. */
  issuer: URL
  clientId: string
  /** Null for a client without a secret; PKCE protects either. */
  clientSecret: string | null
  /** What people know it by. */
  name: string
}

const LOOPBACK = ['localhost', '127.0.0.1', '[::1]']

/** Whether what is sent there can be read on the way. */
export const isPlain = ({ protocol }: URL): boolean => protocol !== 'https:'

function issuerOf(text: string): URL {
  const url = URL.canParse(text) ? new URL(text) : null
  const isSafe = url && (!isPlain(url) || (url.protocol === 'http:' && LOOPBACK.includes(url.hostname)))
  if (!url || !isSafe || url.search || url.hash || url.username)
    throw new Error(
      `OIDC_ISSUER is ${text}; it has to be the HTTPS address of the identity provider, such as https://id.example.`,
    )
  return url
}

/**
 * Reads `OIDC_ISSUER`, `OIDC_CLIENT_ID`, `OIDC_CLIENT_SECRET` and `OIDC_NAME`; null where there is no provider.
 * @throws Error naming the variable that is missing or wrong, never with the secret
 */
export function providerSettingsOf(env: Record<string, string | undefined>): ProviderSettings | null {
  const { OIDC_ISSUER: issuer, OIDC_CLIENT_ID: clientId, OIDC_CLIENT_SECRET: secret, OIDC_NAME: name } = env
  if (!issuer) {
    if (clientId || secret) throw new Error('OIDC_ISSUER has to be set with OIDC_CLIENT_ID: who the provider is.')
    return null
  }
  if (!clientId)
    throw new Error('OIDC_CLIENT_ID has to be set with OIDC_ISSUER: what the provider knows this server by.')
  const url = issuerOf(issuer)
  return { issuer: url, clientId, clientSecret: secret || null, name: name?.trim() || url.hostname }
}
