import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { DEMO_PASSWORD } from '../../shared/demo-accounts'
import { launch } from '../support/browser'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { IdentityProvider } from '../support/identity-provider'
import { CLIENT, startIdentityProvider } from '../support/identity-provider'
import type { RunningServer } from '../support/server'
import { startServer } from '../support/server'

const reader = { sub: 'tomas', email: 'reader@brackwater.example', email_verified: true, name: 'Tomas Reyl' }
let provider: IdentityProvider
let server: RunningServer
let browser: Browser

beforeAll(async () => {
  provider = await startIdentityProvider(reader)
  server = await startServer({
    ...{ DEMO: 'true', DATA_DIR: seededFolder(), OIDC_ISSUER: provider.issuer.href, OIDC_NAME: 'Harbour ID' },
    ...{ OIDC_CLIENT_ID: CLIENT.id, OIDC_CLIENT_SECRET: CLIENT.secret },
  })
  browser = await launch()
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
  await provider?.close()
})

async function open(path: string): Promise<Page> {
  const page = await (await browser.newContext({ viewport: { width: 1280, height: 900 } })).newPage()
  page.setDefaultTimeout(30_000)
  await page.goto(server.url + path, { waitUntil: 'networkidle' })
  return page
}
const through = (page: Page) => page.getByRole('button', { name: 'Sign in through Harbour ID' }).click()

it('signs in through the provider, goes on to the page that was wanted, and can be linked and unlinked', async () => {
  provider.visitor = reader
  const page = await open('/account')
  await through(page)
  await page.getByText('Tomas Reyl, reader@brackwater.example').waitFor()
  expect(page.url()).toBe(`${server.url}/account`)
  await page.getByText('Your account is linked since').waitFor()
  // The page came from the provider: what it shows before its script has run does nothing yet.
  await page.waitForLoadState('networkidle')

  await page.getByRole('button', { name: 'Unlink it' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Unlink', exact: true }).click()
  await page.getByText('Your account is not linked.').waitFor()
  provider.visitor = { sub: 'tomas at home' }
  await page.getByRole('button', { name: 'Link your account' }).click()
  await page.getByRole('dialog').getByRole('textbox', { name: 'Password' }).fill('not it')
  await page.getByRole('button', { name: 'Go to Harbour ID' }).click()
  await page.getByText('this is not your password').waitFor()
  await page.getByRole('dialog').getByRole('textbox', { name: 'Password' }).fill(DEMO_PASSWORD)
  await page.getByRole('button', { name: 'Go to Harbour ID' }).click()
  await page.getByText('Your account is linked since').waitFor()
})

it('says why a person is not let in', async () => {
  provider.visitor = { ...reader, sub: 'somebody', email_verified: false }
  const page = await open('/sign-in')
  await through(page)
  await page.getByText('The provider confirms no address of yours.').waitFor()
})

it('takes what the provider sent in the browser alone that was sent there', async () => {
  provider.visitor = { sub: 'tomas at home' }
  const client = new Client(server.url)
  const begun = await client.post<{ url: string }>('/api/provider', {})
  const { pathname, search } = await provider.visit(begun.body.url)
  const page = await open(pathname + search)
  await page.getByText('This was begun in another browser').waitFor()
  expect(page.url()).toContain('/sign-in')
})

it('joins by an invitation through the provider', async () => {
  const owner = await Client.signedIn(server.url, 'owner')
  const invitation = { email: 'nell@example.org', roles: ['reader'] }
  const { link } = (await owner.post<{ link: string }>('/api/invitations', invitation)).body
  provider.visitor = { sub: 'nell', email: invitation.email, email_verified: true, name: 'Nell Tarn' }
  const page = await open(new URL(link).pathname)
  await page.getByRole('button', { name: 'Join through Harbour ID' }).click()
  await page.getByRole('heading', { level: 1, name: 'Problems' }).waitFor()
  await page.getByRole('link', { name: 'Nell Tarn' }).waitFor()
})
