import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { launch, watchPage } from '../support/browser'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'
import { until } from '../support/server'

let server: RunningServer
let browser: Browser
let developer: Client
/** Of the reviewer: two tabs of one browser, and a window as narrow as a telephone. */
let reviewing: BrowserContext
let first: Page
let second: Page
let narrow: Page
/** What pages complained about. */
const complaints: string[][] = []

beforeAll(async () => {
  server = await startDemo()
  browser = await launch()
  developer = await Client.signedIn(server.url, 'developer')
  const reviewer = await Client.signedIn(server.url, 'reviewer')
  await reviewer.post('/api/news/read')
  reviewing = await contextOf(reviewer, 1280)
  first = await open(reviewing, '/')
  second = await open(reviewing, '/news')
  narrow = await open(await contextOf(await Client.signedIn(server.url, 'reviewer'), 390), '/machines')
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

async function contextOf(client: Client, width: number): Promise<BrowserContext> {
  const context = await browser.newContext({ viewport: { width, height: 900 } })
  await context.addCookies(client.browserCookies())
  return context
}

async function open(context: BrowserContext, path: string): Promise<Page> {
  const page = await context.newPage()
  page.setDefaultTimeout(30_000)
  complaints.push(watchPage(page, server.url))
  await page.goto(server.url + path, { waitUntil: 'networkidle' })
  return page
}

const rail = (page: Page) => page.getByRole('navigation', { name: 'Main' }).getByRole('link', { name: /^News/ })
const textOf = async (page: Page): Promise<string> => (await rail(page).innerText()).replace(/\s+/g, ' ')
const unread = (page: Page, n: number) =>
  until(async () => (await textOf(page)) === (n ? `News ${n} unread` : 'News'), 10, `${n} unread`)

/** A run sheet of the developer’s own that is still a draft. */
async function draft(): Promise<string> {
  const [sheet] = (await developer.get<{ items: { id: string }[] }>('/api/run-sheets')).body.items
  return (await developer.post<{ id: string }>(`/api/run-sheets/${sheet!.id}/duplicate`)).body.id
}

/** Names the reviewer in remarks on a run sheet. */
async function mention(...words: string[]): Promise<void> {
  const [sheet] = (await developer.get<{ items: { id: string }[] }>('/api/run-sheets')).body.items
  const people = (await developer.get<{ items: { id: string; name: string }[] }>('/api/people')).body.items
  const { id } = people.find(({ name }) => name === 'Maud Okafor')!
  for (const word of words)
    await developer.post(`/api/run-sheets/${sheet!.id}/remarks`, { remark: `${word}, @[${id}].` })
}

it('counts what is submitted in another browser without being loaded again, in every tab, wide and narrow', async () => {
  await Promise.all([unread(first, 0), unread(second, 0)])
  await second.getByText('All').waitFor()
  const page = await open(await contextOf(developer, 1280), `/run-sheets/${await draft()}`)
  await page.getByRole('button', { name: 'Submit for review' }).click()
  await page.getByText('Settings locked while in review').waitFor()
  await Promise.all([unread(first, 1), unread(second, 1)])
  await narrow.getByRole('link', { name: 'News 1 unread' }).waitFor()
  await second
    .getByRole('link', { name: /waits for review/ })
    .first()
    .waitFor()
  expect(await first.getByRole('status', { name: 'News' }).textContent()).toMatch(/^News: RS-\d+ waits for review/)
  await page.close()
})

it('leads to what it is about, and is read then, in every tab', async () => {
  await narrow.getByRole('link', { name: 'News 1 unread' }).click()
  await narrow.getByRole('button', { name: /^Mark read/ }).waitFor()
  await second
    .getByRole('link', { name: /waits for review/ })
    .first()
    .click()
  await second.waitForURL(/\/run-sheets\//)
  await Promise.all([unread(first, 0), unread(second, 0)])
  await until(async () => !(await narrow.getByRole('button', { name: /^Mark read/ }).count()), 10, 'nothing to be read')
  expect(await narrow.getByRole('link', { name: 'News 1 unread' }).count()).toBe(0)
})

it('is read item by item, or all at once, which stays so', async () => {
  await mention('One', 'Two', 'Three')
  await second.goto(`${server.url}/news?show=unread`, { waitUntil: 'networkidle' })
  await unread(second, 3)
  await second
    .getByRole('button', { name: /^Mark read/ })
    .first()
    .press('Enter')
  await unread(second, 2)
  // Stays where it was, so that the next one is not moved under the pointer.
  expect(await second.getByText('Three, @Maud Okafor.').count()).toBe(1)
  await second.getByRole('button', { name: 'Mark all read' }).click()
  await unread(second, 0)
  await unread(first, 0)
  await second.reload({ waitUntil: 'networkidle' })
  await second.getByText('Nothing unread').waitFor()
})

it('counts nothing any more once one signed out in another tab', async () => {
  await mention('Four')
  await Promise.all([unread(first, 1), unread(second, 1)])
  await second.getByRole('button', { name: 'Sign out' }).click()
  await second.waitForURL(/sign-in/)
  await unread(first, 0)
})

it('fills no console', () => {
  const signedOut = /401|409/
  expect(complaints.flat().filter((line) => !signedOut.test(line))).toEqual([])
})
