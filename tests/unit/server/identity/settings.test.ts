import { expect, it } from 'vitest'
import { providerSettingsOf } from '../../../../server/identity/settings'
import { goToProviderSchema } from '../../../../shared/schemas/identities'

const WHOLE = { OIDC_ISSUER: 'https://id.example/realm', OIDC_CLIENT_ID: 'espalier', OIDC_CLIENT_SECRET: 's3cret' }

it('reads the provider, and needs none', () => {
  expect(providerSettingsOf({})).toBeNull()
  expect(providerSettingsOf({ ...WHOLE, OIDC_NAME: ' Harbour ID ' })).toEqual({
    ...{
      issuer: new URL('https://id.example/realm'),
      clientId: 'espalier',
      clientSecret: 's3cret',
      name: 'Harbour ID',
    },
  })
  expect(providerSettingsOf({ ...WHOLE, OIDC_CLIENT_SECRET: '' })).toMatchObject({
    clientSecret: null,
    name: 'id.example',
  })
})

it.each([
  [{ OIDC_ISSUER: '' }, /OIDC_ISSUER has to be set/],
  [{ OIDC_CLIENT_ID: '' }, /OIDC_CLIENT_ID has to be set/],
  [{ OIDC_ISSUER: 'http://id.example' }, /HTTPS/],
  [{ OIDC_ISSUER: 'id.example' }, /HTTPS/],
  [{ OIDC_ISSUER: 'https://id.example/?a=b' }, /HTTPS/],
  [{ OIDC_ISSUER: 'ftp://localhost' }, /HTTPS/],
])('says what is wrong with %o, never with the secret', (change, words) => {
  expect(() => providerSettingsOf({ ...WHOLE, ...change })).toThrow(words)
  expect(() => providerSettingsOf({ ...WHOLE, ...change })).not.toThrow(/s3cret/)
})

it('takes a plain provider on this machine alone', () => {
  expect(providerSettingsOf({ ...WHOLE, OIDC_ISSUER: 'http://127.0.0.1:9' })?.issuer.port).toBe('9')
})

it('goes on to paths of the product alone', () => {
  const goes = (next: string) => goToProviderSchema.safeParse({ next }).success
  expect(['/', '/account', '/run-sheets/review?x=1#y'].filter(goes)).toHaveLength(3)
  expect(['//evil.example', '/\\evil.example', 'https://evil.example', '/\t/evil.example', ''].filter(goes)).toEqual([])
})
