import { readFileSync } from 'node:fs'
import { unzipSync } from 'fflate'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launch, watchPage } from '../support/browser'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

let server: RunningServer
let browser: Browser
const pages = new Map<string, Page>()
const complaints: string[][] = []
let address: string
let number: string

async function signedIn(person: string): Promise<Page> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, acceptDownloads: true })
  await context.addCookies((await Client.signedIn(server.url, person)).browserCookies())
  const page = await context.newPage()
  page.setDefaultTimeout(20_000)
  complaints.push(watchPage(page, server.url))
  return page
}

beforeAll(async () => {
  ;[server, browser] = await Promise.all([startDemo(), launch()])
  for (const person of ['developer', 'reviewer', 'owner']) pages.set(person, await signedIn(person))
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

async function opened(person: string): Promise<Page> {
  const page = pages.get(person)!
  await page.goto(address, { waitUntil: 'networkidle' })
  return page
}

describe('the path of a run sheet', () => {
  it('begins as a duplicate of one that was returned', async () => {
    const page = pages.get('developer')!
    await page.goto(`${server.url}/run-sheets`)
    await page.getByRole('link', { name: 'Deck radio channels, first run' }).click()
    await page.waitForLoadState('networkidle')
    await page.getByRole('button', { name: 'More', exact: true }).click()
    await page.getByRole('menuitem', { name: 'Duplicate' }).click()
    await page.getByText('Made from').waitFor()
    address = page.url()
    number = /RS-\d+/.exec(await page.getByRole('heading', { level: 1 }).innerText())![0]
    await page.getByRole('link', { name: 'Go to Rehearsal' }).click()
    expect(await page.evaluate(() => document.activeElement?.textContent?.trim())).toMatch(/Rehearsal and samples/)
  })

  it('is submitted, and sent back with a remark', async () => {
    const developer = pages.get('developer')!
    await developer.getByRole('textbox', { name: 'Remark to the reviewer' }).fill('Stronger chains than last time.')
    await developer.getByRole('button', { name: 'Submit for review' }).click()
    await developer.getByText('Settings locked while in review').waitFor()
    const reviewer = await opened('reviewer')
    const signOff = reviewer.getByRole('region', { name: 'Sign-off' })
    await signOff.getByRole('textbox', { name: 'Remark' }).fill('Half the reads will do.')
    await signOff.getByRole('button', { name: 'Send back' }).click()
    await reviewer.getByText('sent back').first().waitFor()
  })

  it('is corrected, submitted again, and approved', async () => {
    const developer = await opened('developer')
    await developer.getByText('Half the reads will do.').first().waitFor()
    await developer.locator('#field-reads').fill('500')
    await developer.getByText(/^Saved/).waitFor()
    await developer.getByRole('button', { name: 'Submit for review' }).click()
    await developer.getByText('Settings locked while in review').waitFor()
    const reviewer = await opened('reviewer')
    await reviewer.getByRole('button', { name: 'Approve' }).click()
    await reviewer.getByText('Settings frozen on approval').waitFor()
  })

  it('gives out its bundle, and is issued', async () => {
    const developer = await opened('developer')
    const download = developer.waitForEvent('download')
    await developer.getByRole('link', { name: 'Bundle, ZIP' }).click()
    const file = await download
    expect(file.suggestedFilename()).toBe(`${number}.zip`)
    const entries = unzipSync(readFileSync(await file.path()))
    expect(Object.keys(entries)).toContain(`${number}/SHA256SUMS`)
    expect(new TextDecoder().decode(entries[`${number}/README.txt`])).toContain('500 reads')
    await developer.getByRole('button', { name: 'Issue' }).click()
    await developer
      .getByText(/^issued$/)
      .first()
      .waitFor()
  })

  it('wrote to everyone concerned', async () => {
    const owner = pages.get('owner')!
    await owner.goto(`${server.url}/outbox`, { waitUntil: 'networkidle' })
    const rows = await owner.getByRole('row').filter({ hasText: number }).allInnerTexts()
    const told = rows.map((text) =>
      /(waits for review|was sent back|is approved|is issued).*?(developer|reviewer)@/s.exec(text),
    )
    expect(told.map((match) => `${match?.[1]}, ${match?.[2]}`)).toEqual([
      'is issued, reviewer',
      'is approved, developer',
      'waits for review, reviewer',
      'was sent back, developer',
      'waits for review, reviewer',
    ])
    await owner.getByText(`${number} was sent back`).click()
    await owner.getByText('> Half the reads will do.').waitFor()
    expect(complaints.flat()).toEqual([])
  })
})
