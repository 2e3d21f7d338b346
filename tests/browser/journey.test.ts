import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createRandom } from '../../shared/engine/random'
import { Client } from '../support/client'
import { launch, watchPage } from '../support/browser'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

/** A random problem of 60 variables at density 0.1, as a modelling script would write it. */
function problemFile(): string {
  const random = createRandom(60)
  const lines = ['# sixty variables, a tenth of all pairs']
  for (let i = 0; i < 60; i++) {
    lines.push(`v${i} v${i} ${random.below(9) - 4}`)
    for (let j = i + 1; j < 60; j++)
      if (random.float() < 0.1) lines.push(`v${i} v${j} ${random.below(2) === 0 ? -1 : 1}`)
  }
  return lines.join('\n')
}

let server: RunningServer
let browser: Browser
let page: Page
let complaints: string[]
let missing: number[]

beforeAll(async () => {
  server = await startDemo()
  browser = await launch()
  page = await (await browser.newContext({ viewport: { width: 1280, height: 900 } })).newPage()
  page.setDefaultTimeout(30_000)
  complaints = watchPage(page, server.url)
  // Which qubits a P(16) has is asked of the product; two in a hundred are then said to be missing.
  const steward = await Client.signedIn(server.url, 'steward')
  const { body } = await steward.post<{ id: string }>('/api/machines', {
    name: 'Whole',
    family: { kind: 'pegasus', m: 16 },
  })
  const { nodes } = (await steward.get<{ nodes: number[] }>(`/api/machines/${body.id}/graph`)).body
  const random = createRandom(2)
  missing = nodes.filter(() => random.float() < 0.02)
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

async function signIn(person: string): Promise<void> {
  await page.goto(`${server.url}/sign-in`)
  await page.getByRole('textbox', { name: 'E-mail' }).fill(`${person}@brackwater.example`)
  await page.locator('input[type=password]').fill('brackwater-demo')
  await page.getByRole('button', { name: 'Sign in', exact: true }).click()
  await page.getByRole('heading', { level: 1, name: 'Problems' }).waitFor()
}

async function signOut(): Promise<void> {
  await page.getByRole('button', { name: 'Sign out' }).click()
  await page.getByRole('heading', { name: 'Sign in' }).waitFor()
}

describe('the whole job, by hand', () => {
  it('starts at the sign-in page, which says when something does not match', async () => {
    await page.goto(server.url)
    await page.getByRole('heading', { name: 'Sign in' }).waitFor()
    await page.getByRole('textbox', { name: 'E-mail' }).fill('developer@brackwater.example')
    await page.locator('input[type=password]').fill('not it')
    await page.getByRole('button', { name: 'Sign in', exact: true }).click()
    await page.getByText('do not belong together').waitFor()
    // The refused sign-in is answered with 401, which Chromium reports; nothing else may be.
    expect(complaints.splice(0).filter((complaint) => !complaint.includes('401'))).toEqual([])
  })

  it('lets the steward enter a machine with missing qubits', async () => {
    await signIn('steward')
    await page.goto(`${server.url}/machines/new`)
    await page.getByRole('textbox', { name: 'Name' }).fill('Rowan')
    await page.getByRole('radio', { name: 'Pegasus' }).click()
    await page.getByRole('textbox', { name: 'Size m' }).fill('16')
    await page.getByRole('textbox', { name: 'Missing qubits and couplers' }).fill(missing.join(' '))
    await page.getByRole('button', { name: 'Add the machine' }).click()
    await page.getByRole('heading', { level: 1, name: 'Rowan' }).waitFor()
    await page.getByText(`of 5${'\u2009'}640`).first().waitFor()
    await signOut()
  })

  it('shows what was understood of a file before saving it', async () => {
    await signIn('developer')
    await page.getByRole('link', { name: 'New problem' }).first().click()
    await page.setInputFiles('input[type=file]', {
      name: 'sixty.txt',
      mimeType: 'text/plain',
      buffer: Buffer.from(`${problemFile()}\nv1 v2 NaN\n`),
    })
    await page.getByRole('heading', { name: 'Rejected lines' }).waitFor()
    await page.getByRole('button', { name: 'Start over' }).click()
    await page.setInputFiles('input[type=file]', {
      name: 'sixty.txt',
      mimeType: 'text/plain',
      buffer: Buffer.from(problemFile()),
    })
    await page.getByText('Nothing is saved yet').waitFor()
    await page.getByRole('textbox', { name: 'Name' }).fill('Sixty at a tenth')
    await page.getByRole('button', { name: 'Save problem' }).click()
    await page.getByRole('heading', { level: 1, name: 'Sixty at a tenth' }).waitFor()
    await page.getByRole('heading', { name: 'Both forms' }).waitFor()
  })

  it('embeds it on the machine and verifies the chains', async () => {
    await page.getByRole('link', { name: 'New embedding' }).click()
    await page.getByRole('radio', { name: /Rowan/ }).click()
    await page.getByText('More settings').click()
    await page.getByRole('textbox', { name: 'Tries' }).fill('1')
    await page.getByRole('button', { name: 'Look for an embedding' }).click()
    await page.getByText('Verified: chains connected').waitFor({ timeout: 60_000 })
    await page.getByRole('heading', { name: 'Chain ledger' }).waitFor()
    await page.locator('canvas').first().waitFor()
    expect(await page.getByRole('row').count()).toBeGreaterThan(5)
  })

  it('programmes it on a run sheet and rehearses', async () => {
    await page.getByRole('button', { name: 'Use in a run sheet' }).click()
    await page.getByRole('heading', { level: 1, name: /Run sheet/ }).waitFor()
    await page.getByRole('radio', { name: 'Cut bound' }).click()
    await page.getByText('k is above the cut bound on every chain').waitFor()
    await page.getByRole('form', { name: 'Rehearsal' }).getByRole('textbox', { name: 'Reads' }).fill('500')
    await page.getByRole('form', { name: 'Rehearsal' }).getByRole('button', { name: 'Rehearse' }).click()
    await page.getByRole('link', { name: 'Rehearsal 1' }).click({ timeout: 60_000 })
  })

  it('shows where chains broke', async () => {
    await page.getByRole('heading', { level: 1, name: /Rehears|samples/ }).waitFor()
    await page.getByRole('heading', { name: 'Chain breaks' }).waitFor()
    await page.getByText('not a forecast of the machine').first().waitFor()
    await page.getByRole('radio', { name: /Discard/ }).click()
    await page.waitForURL(/decode=discard/)
    await page.getByRole('link', { name: 'Show on the lattice' }).click()
    await page.getByRole('heading', { name: 'Chain ledger' }).waitFor()
  })

  it('hands the sheet to the reviewer, who approves it', async () => {
    await page.getByRole('link', { name: /^Open RS-/ }).click()
    await page.getByRole('button', { name: 'Submit for review' }).click()
    await page.getByText('in review').first().waitFor()
    const sheet = page.url()
    await signOut()
    await signIn('reviewer')
    await page.goto(sheet)
    await page.getByRole('button', { name: 'Approve' }).click()
    await page.getByText('approved').first().waitFor()
  })

  it('takes no more than a minute of work, and the console stays empty', () => {
    expect(complaints).toEqual([])
  })
})
