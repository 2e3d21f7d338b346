import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { launch } from '../support/browser'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

let server: RunningServer
let browser: Browser
let context: BrowserContext
let developer: Client

beforeAll(async () => {
  server = await startDemo()
  browser = await launch()
  developer = await Client.signedIn(server.url, 'developer')
  context = await browser.newContext({ viewport: { width: 1280, height: 900 } })
  await context.addCookies(developer.browserCookies())
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

async function tab(path: string): Promise<Page> {
  const page = await context.newPage()
  page.setDefaultTimeout(30_000)
  await page.goto(server.url + path, { waitUntil: 'networkidle' })
  return page
}

async function makeToken(page: Page, name: string): Promise<void> {
  await page.getByRole('button', { name: 'Make a token' }).click()
  await page.getByRole('textbox', { name: 'Name' }).fill(name)
  await page.getByRole('dialog').getByRole('button', { name: 'Make' }).click()
}

const tokens = async () => (await developer.get<{ items: { name: string }[] }>('/api/tokens')).body.items

it('lets no tab write into a workspace that it does not show', async () => {
  const before = await tab('/people/tokens')
  const other = await tab('/')
  await other.getByRole('button', { name: 'Workspace Brackwater Ferries' }).click()
  await other.getByRole('menuitem', { name: 'New workspace' }).click()
  await other.getByRole('textbox', { name: 'Name' }).fill('Island trials')
  await other.getByRole('button', { name: 'Make and go there' }).click()
  await other.getByRole('button', { name: 'Workspace Island trials' }).waitFor()

  await before.getByText('You went to another workspace in another tab.').waitFor()
  await makeToken(before, 'of which workspace')
  await before.getByText('This page is of another workspace than the one').waitFor()
  expect(await tokens()).toEqual([])

  await before.keyboard.press('Escape')
  await before.getByRole('button', { name: 'Back to Brackwater Ferries' }).click()
  await before.getByRole('heading', { level: 1, name: 'Problems' }).waitFor()
  await before.goto(`${server.url}/people/tokens`, { waitUntil: 'networkidle' })
  await makeToken(before, 'of the ferries')
  await before.getByText('Copy the token of the ferries now').waitFor()
  expect(await tokens()).toMatchObject([{ name: 'of the ferries' }])
  await other.getByText('You went to another workspace in another tab.').waitFor()
})
