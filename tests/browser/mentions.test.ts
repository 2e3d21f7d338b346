import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { launch } from '../support/browser'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

let server: RunningServer
let browser: Browser
let page: Page
let developer: Client
let sheet: string

beforeAll(async () => {
  server = await startDemo()
  browser = await launch()
  developer = await Client.signedIn(server.url, 'developer')
  sheet = (await developer.get<{ items: { id: string }[] }>('/api/run-sheets')).body.items[0]!.id
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 } })
  await context.addCookies(developer.browserCookies())
  page = await context.newPage()
  page.setDefaultTimeout(30_000)
  await page.goto(`${server.url}/run-sheets/${sheet}`, { waitUntil: 'networkidle' })
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

it('offers members after an at sign, chosen with keys alone, and sends whom by id', async () => {
  const form = page.getByRole('form', { name: 'Remark' })
  const box = form.getByRole('textbox', { name: 'Remark' })
  await box.focus()
  await page.keyboard.type('Please look, @')
  const options = form.getByRole('option')
  await options.first().waitFor()
  expect(await options.count()).toBe(5)
  await page.keyboard.press('ArrowDown')
  const active = await box.getAttribute('aria-activedescendant')
  expect(await form.locator(`[id="${active}"]`).getAttribute('aria-selected')).toBe('true')
  await page.keyboard.press('Escape')
  expect(await options.count()).toBe(0)
  await page.keyboard.type('oka')
  await options.first().waitFor()
  expect(await form.getByText('1 member: up and down to go, Enter to take').count()).toBe(1)
  await page.keyboard.press('Enter')
  expect(await box.inputValue()).toBe('Please look, @Maud Okafor ')
  await page.keyboard.type('and say.')
  await page.keyboard.press('Tab')
  await page.keyboard.press('Enter')
  await page.getByText('Please look, @Maud Okafor and say.').waitFor()
  const view = (
    await developer.get<{ remarks: { text: string; mentions: { id: string; name: string }[] }[] }>(
      `/api/run-sheets/${sheet}`,
    )
  ).body
  const { text, mentions } = view.remarks.at(-1)!
  expect(mentions).toMatchObject([{ name: 'Maud Okafor' }])
  expect(text).toBe(`Please look, @[${mentions[0]!.id}] and say.`)
})

it('offers them in the remark of a hand-over too', async () => {
  const reviewer = await Client.signedIn(server.url, 'reviewer')
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 } })
  await context.addCookies(reviewer.browserCookies())
  const theirs = await context.newPage()
  await theirs.goto(`${server.url}/run-sheets/${sheet}`, { waitUntil: 'networkidle' })
  const box = theirs.getByRole('region', { name: 'Sign-off' }).getByRole('textbox', { name: 'Remark' })
  await box.pressSequentially('Fewer reads, @ida')
  await theirs.getByRole('option').first().waitFor()
  await theirs.keyboard.press('Enter')
  await theirs.getByRole('button', { name: 'Send back' }).click()
  await theirs.getByText('Fewer reads, @Ida Fenn').waitFor()
  const { remarks } = (
    await reviewer.get<{ remarks: { what: string; mentions: { name: string }[] }[] }>(`/api/run-sheets/${sheet}`)
  ).body
  expect(remarks.at(-1)).toMatchObject({ what: 'sent back', mentions: [{ name: 'Ida Fenn' }] })
  await context.close()
})
