import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, expect, it } from 'vitest'
import { launch } from '../support/browser'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

let server: RunningServer
let browser: Browser

beforeAll(async () => {
  server = await startDemo()
  browser = await launch()
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

async function open(person: string, path: string): Promise<Page> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 } })
  await context.addCookies((await Client.signedIn(server.url, person)).browserCookies())
  const page = await context.newPage()
  page.setDefaultTimeout(30_000)
  await page.goto(server.url + path, { waitUntil: 'networkidle' })
  return page
}
const dayFromNow = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10)

it('hands reviews over, lets the member decide meanwhile in the reviewer’s place, and takes them back', async () => {
  const away = await open('reviewer', '/people')
  await away.getByRole('button', { name: 'Hand over reviews' }).click()
  await away.getByLabel('Member who reviews meanwhile').selectOption({ label: 'Per Lind, steward' })
  await away.getByRole('button', { name: 'Hand over', exact: true }).click()
  await away.getByText('write a day such as').waitFor()
  await away.getByLabel('Last day (UTC)').fill(dayFromNow(3))
  await away.getByRole('button', { name: 'Hand over', exact: true }).click()
  await away.getByRole('row', { name: /Maud Okafor.*Per Lind.*goes on/ }).waitFor()

  const meanwhile = await open('steward', '/run-sheets/review')
  await meanwhile.getByText('You review for Maud Okafor from').waitFor()
  await meanwhile.getByRole('link', { name: 'Read and decide' }).first().click()
  await meanwhile.getByText('You decide for Maud Okafor, who is away.').waitFor()
  await meanwhile.locator('#sign-off').getByRole('textbox', { name: 'Remark' }).fill('Fewer reads will do.')
  await meanwhile.getByRole('button', { name: 'Send back' }).click()
  await meanwhile.locator('#sign-off').getByText('Per Lind, for Maud Okafor').waitFor()

  await away.getByRole('button', { name: 'Take back the reviews of Maud Okafor' }).click()
  await away.getByRole('dialog').getByRole('button', { name: 'Take back', exact: true }).click()
  await away.getByText('Nobody is away.').waitFor()
  await meanwhile.goto(`${server.url}/run-sheets/review`, { waitUntil: 'networkidle' })
  expect(await meanwhile.getByText('You review for').count()).toBe(0)
})
