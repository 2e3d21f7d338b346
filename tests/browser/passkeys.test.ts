import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { DEMO_PASSWORD } from '../../shared/demo-accounts'
import { launch, watchPage } from '../support/browser'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

let server: RunningServer
let browser: Browser
let context: BrowserContext
/** By name: a passkey is never made for a number. */
let url: string

beforeAll(async () => {
  server = await startDemo()
  url = server.url.replace('127.0.0.1', 'localhost')
  browser = await launch()
  context = await browser.newContext({ viewport: { width: 1280, height: 900 } })
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

/** A page whose browser has an authenticator of its own that is always unlocked. */
async function pageWithAuthenticator(): Promise<Page> {
  const page = await context.newPage()
  page.setDefaultTimeout(30_000)
  const devtools = await context.newCDPSession(page)
  await devtools.send('WebAuthn.enable')
  await devtools.send('WebAuthn.addVirtualAuthenticator', {
    options: {
      ...{ protocol: 'ctap2', transport: 'internal', hasResidentKey: true, hasUserVerification: true },
      ...{ isUserVerified: true, automaticPresenceSimulation: true },
    },
  })
  return page
}

it('is added with the password, opens the account with nothing typed, and opens nothing once removed', async () => {
  const page = await pageWithAuthenticator()
  const complaints = watchPage(page, url)
  await page.goto(`${url}/sign-in`, { waitUntil: 'networkidle' })
  await page.getByRole('textbox', { name: 'E-mail' }).fill('reader@brackwater.example')
  await page.getByRole('textbox', { name: 'Password' }).fill(DEMO_PASSWORD)
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.getByRole('heading', { level: 1, name: 'Problems' }).waitFor()

  await page.goto(`${url}/account`, { waitUntil: 'networkidle' })
  await page.getByRole('button', { name: 'Add a passkey' }).click()
  await page.getByRole('textbox', { name: 'Name' }).fill('Lock of the laptop')
  await page.getByRole('dialog').getByRole('textbox', { name: 'Password' }).fill(DEMO_PASSWORD)
  await page.getByRole('button', { name: 'Add it' }).click()
  await page.getByText('The passkey Lock of the laptop is added.').waitFor()
  await page.getByRole('row', { name: /Lock of the laptop.*not used yet/ }).waitFor()

  await context.clearCookies()
  await page.goto(`${url}/sign-in`, { waitUntil: 'networkidle' })
  await page.getByRole('button', { name: 'Sign in with a passkey' }).click()
  await page.getByRole('heading', { level: 1, name: 'Problems' }).waitFor()
  await page.goto(`${url}/account`, { waitUntil: 'networkidle' })
  expect(complaints).toEqual([])

  await page.getByRole('button', { name: 'Remove the passkey Lock of the laptop' }).click()
  await page.getByRole('dialog').getByRole('button', { name: 'Remove', exact: true }).click()
  await page.getByText('The passkey is removed.').waitFor()
  await context.clearCookies()
  await page.goto(`${url}/sign-in`, { waitUntil: 'networkidle' })
  await page.getByRole('button', { name: 'Sign in with a passkey' }).click()
  await page.getByText('This passkey opens no account here.').waitFor()
})

it('says where passkeys cannot be used, and why', async () => {
  const page = await context.newPage()
  await page.goto(`${server.url}/sign-in`, { waitUntil: 'networkidle' })
  await page.getByText('Passkeys need an address with a name, such as localhost').waitFor()
  expect(await page.getByRole('button', { name: 'Sign in with a passkey' }).getAttribute('aria-disabled')).toBe('true')
})
