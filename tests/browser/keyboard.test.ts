import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launch, watchPage } from '../support/browser'
import { Keyboard } from '../support/keyboard'
import { startDemo } from '../support/demo'
import type { RunningServer } from '../support/server'

/* The main job without a mouse: nothing here clicks, hovers or focuses by script; only keys are pressed. */

const PROBLEM = ['# a ring of eight with four chords', '# form: ising']
  .concat([0, 1, 2, 3, 4, 5, 6, 7].map((i) => `s${i} s${(i + 1) % 8} ${i % 2 === 0 ? 1 : -1}`))
  .concat([0, 1, 2, 3].map((i) => `s${i} s${i + 4} 0.5`))
  .join('\n')

let server: RunningServer
let browser: Browser
let page: Page
let keys: Keyboard
let complaints: string[]

beforeAll(async () => {
  server = await startDemo()
  browser = await launch()
  page = await (await browser.newContext({ viewport: { width: 1280, height: 900 } })).newPage()
  page.setDefaultTimeout(30_000)
  complaints = watchPage(page, server.url)
  keys = new Keyboard(page)
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

const heading = (name: string | RegExp, level = 1) => page.getByRole('heading', { level, name })

describe('the main job by keyboard alone', () => {
  it('signs in', async () => {
    await page.goto(server.url)
    await heading('Sign in').waitFor()
    await keys.write(page.getByRole('textbox', { name: 'E-mail' }), 'developer@brackwater.example')
    await keys.write(page.locator('input[type=password]'), 'brackwater-demo')
    await keys.press('Enter')
    await heading('Problems').waitFor()
  })

  it('skips the rail and opens a new problem', async () => {
    await page.reload()
    await heading('Problems').waitFor()
    await keys.press('Tab')
    await keys.press('Enter')
    await keys.use(page.getByRole('link', { name: 'New problem' }).first())
    await heading('New problem').waitFor()
  })

  it('pastes the coefficients and saves them', async () => {
    await keys.write(page.getByRole('textbox', { name: 'Paste coefficients' }), PROBLEM)
    await page.getByText('Nothing is saved yet').waitFor()
    await keys.write(page.getByRole('textbox', { name: 'Name' }), 'Ring by keyboard')
    await keys.press('Enter')
    await heading('Ring by keyboard').waitFor()
  })

  it('starts a search on a machine', async () => {
    await keys.use(page.getByRole('link', { name: 'New embedding' }))
    await keys.choose(page.getByRole('radio', { name: /Juniper/ }))
    await keys.use(page.getByRole('button', { name: 'Look for an embedding' }))
    await page.getByText('Verified: chains connected').waitFor({ timeout: 60_000 })
  })

  it('reads the ledger and focuses and selects a chain', async () => {
    const ledger = page.getByRole('grid', { name: 'Chain ledger' })
    await ledger.waitFor()
    await keys.to(ledger.locator('[role=row][tabindex="0"]'))
    await keys.press('ArrowDown', 'Enter', 'Space')
    await ledger.locator('[role=row][aria-current=true][aria-selected=true]').waitFor()
    await keys.press('Escape', 'Escape')
    await ledger.locator('[aria-current=true], [aria-selected=true]').waitFor({ state: 'detached' })
  })

  it('moves and enlarges the lattice', async () => {
    const lattice = page.getByRole('group', { name: /^Lattice/ })
    await keys.to(lattice, 'Shift+Tab')
    const before = await lattice.screenshot()
    await keys.press('+', '+', 'ArrowRight')
    await expect.poll(async () => before.equals(await lattice.screenshot())).toBe(false)
    await keys.press('0')
  })

  it('puts it on a run sheet and rehearses', async () => {
    await keys.use(page.getByRole('button', { name: 'Use in a run sheet' }))
    await heading(/Run sheet/).waitFor()
    await keys.choose(page.getByRole('radio', { name: 'Cut bound' }))
    await page.getByText('k is above the cut bound on every chain').waitFor()
    const rehearsal = page.getByRole('form', { name: 'Rehearsal' })
    await keys.write(rehearsal.getByRole('textbox', { name: 'Reads' }), '200')
    await keys.use(rehearsal.getByRole('button', { name: 'Rehearse' }))
    const link = page.getByRole('link', { name: 'Rehearsal 1' })
    await link.waitFor({ timeout: 60_000 })
    await keys.use(link)
  })

  it('reads what came back, with another decoding', async () => {
    await heading(/Rehears|samples/).waitFor()
    await keys.choose(page.getByRole('radio', { name: /Discard/ }))
    await page.waitForURL(/decode=discard/)
    await keys.use(page.getByRole('link', { name: 'Show on the lattice' }))
    await page.getByRole('grid', { name: 'Chain ledger' }).waitFor()
  })

  it('leaves the console empty', () => expect(complaints).toEqual([]))
})
