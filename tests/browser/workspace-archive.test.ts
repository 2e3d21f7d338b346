import { readFileSync } from 'node:fs'
import { strFromU8, unzipSync, zipSync } from 'fflate'
import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launch, watchPage } from '../support/browser'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import { emptyFolder } from '../support/folders'
import { startBare } from '../support/pages/worlds'
import type { RunningServer } from '../support/server'

const SHEET = 'Deck radio channels, first run'

let demo: RunningServer
let other: RunningServer
let browser: Browser
/** Of the demo’s owner, and of the owner of another installation. */
let here: Page
let there: Page
let founder: Client
const complaints: string[][] = []

async function pageOf(client: Client): Promise<Page> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, acceptDownloads: true })
  await context.addCookies(client.browserCookies())
  const page = await context.newPage()
  page.setDefaultTimeout(30_000)
  complaints.push(watchPage(page, client.url))
  return page
}

beforeAll(async () => {
  const bare = startBare(emptyFolder())
  ;[demo, other, browser] = await Promise.all([startDemo(), bare.then(({ server }) => server), launch()])
  founder = (await (await bare).setUp()).client
  here = await pageOf(await Client.signedIn(demo.url, 'owner'))
  there = await pageOf(founder)
})
afterAll(async () => {
  await browser?.close()
  await Promise.all([demo?.stop(), other?.stop()])
})

/** Goes to the page about the workspace from the first page, by its links. */
async function openWorkspace(page: Page, url: string): Promise<void> {
  await page.goto(url, { waitUntil: 'networkidle' })
  await page.getByRole('navigation', { name: 'Main' }).getByRole('link', { name: 'People' }).click()
  await page.getByRole('link', { name: 'Workspace', exact: true }).click()
  await page.getByRole('heading', { level: 2, name: 'Import' }).waitFor()
  await page.waitForLoadState('networkidle')
}

const importing = () => there.getByRole('region', { name: 'Import' })

async function choose(name: string, buffer: Uint8Array): Promise<void> {
  const chooser = there.waitForEvent('filechooser')
  await importing()
    .getByRole('button', { name: /^Choose/ })
    .click()
  await (await chooser).setFiles({ name, mimeType: 'application/zip', buffer: Buffer.from(buffer) })
}

async function send(name: string, buffer: Uint8Array): Promise<void> {
  await choose(name, buffer)
  await importing().getByRole('button', { name: 'Import it' }).click()
}

/** Fingerprints on the page of a run sheet, in full. */
async function fingerprintsOn(page: Page): Promise<string> {
  await page.getByText('Fingerprints in full').click()
  const list = page.locator('details[open] dl').filter({ hasText: 'programmed' })
  await list.waitFor()
  return list.innerText()
}

let archive: Uint8Array
let address: string
let fingerprints: string
/** Lines of the table that says what the archive holds. */
let held: string[]

describe('the archive of a workspace', () => {
  it('is handed out with what its owner is told that it holds', async () => {
    await here.goto(`${demo.url}/run-sheets`, { waitUntil: 'networkidle' })
    await here.getByRole('link', { name: SHEET }).click()
    await here.waitForURL(/run-sheets\/[\w-]+$/)
    address = new URL(here.url()).pathname
    fingerprints = await fingerprintsOn(here)
    expect(fingerprints.match(/[0-9a-f]{64}/g)).toHaveLength(3)

    await openWorkspace(here, demo.url)
    held = await here.getByRole('table').first().getByRole('row').allInnerTexts()
    const download = here.waitForEvent('download')
    await here.getByRole('link', { name: 'Export the workspace' }).click()
    const file = await download
    expect(file.suggestedFilename()).toMatch(/^Brackwater-Ferries-\d{4}-\d\d-\d\d\.zip$/)
    archive = readFileSync(await file.path())
    const manifest = JSON.parse(strFromU8(unzipSync(archive)['manifest.json']!)) as { madeBy: string }
    expect(manifest.madeBy).toBe('Rhona Skerry')
  })

  it.each([
    ['a text', 'notes.txt', () => Buffer.from('berths'), 'notes.txt does not end in .zip.'],
    ['a text that is called a ZIP file', 'notes.zip', () => Buffer.from('berths'), 'it is no ZIP file'],
    [
      'a ZIP file of something else',
      'photos.zip',
      () => zipSync({ 'pier.jpg': new Uint8Array(9) }),
      'it holds pier.jpg, which is no part of a workspace',
    ],
    ['an archive that was cut off', 'half.zip', () => archive.subarray(0, archive.length / 2), 'it is no ZIP file'],
    ['an archive that was changed', 'changed.zip', changed, 'its SHA-256 differs'],
  ])('is nothing else: %s is refused in words', async (_what, name, bytes, words) => {
    await openWorkspace(there, other.url)
    if (name.endsWith('.zip')) await send(name, bytes())
    else await choose(name, bytes())
    await importing().getByText(words).waitFor()
    const { workspaces } = (await founder.get<{ workspaces: { name: string }[] }>('/api/session')).body
    expect(workspaces.map((workspace) => workspace.name)).toEqual(['Nothing yet'])
  })

  it('becomes the same workspace elsewhere, says what came, and leads to what links of before lead to', async () => {
    await openWorkspace(there, other.url)
    await there.evaluate(watchProgress)
    await send('workspace.zip', archive)
    await importing().getByText('The archive was taken in.').waitFor()
    const titles = await there.evaluate(() => (globalThis as unknown as Watched).progressSeen)
    expect(titles).toContain('Importing')
    await importing().getByText('all fingerprints are the ones that were exported').waitFor()
    const said = await importing().getByText('Brackwater Ferries is here').innerText()
    expect(said).toContain(wordsOf(held))

    await importing().getByRole('button', { name: 'Go to Brackwater Ferries' }).click()
    await there.getByRole('button', { name: 'Workspace Brackwater Ferries' }).waitFor()
    await there.goto(other.url + address, { waitUntil: 'networkidle' })
    await there.getByText(SHEET).first().waitFor()
    expect(await fingerprintsOn(there)).toBe(fingerprints)
    const problem = there.getByRole('table', { name: 'What this run sheet stands on' }).getByRole('link').first()
    const name = (await problem.innerText()).replace(/^P-\d+ /, '')
    await problem.click()
    await there.getByRole('heading', { level: 1, name }).waitFor()
  })

  it('fills no console but with refusals', () => {
    expect(complaints.flat().filter((line) => !/status of 422/.test(line))).toEqual([])
  })
})

/** The archive with one array that is not what its manifest says. */
function changed(): Uint8Array {
  const files = unzipSync(archive)
  const path = Object.keys(files).find((one) => one.startsWith('blobs/'))!
  const bytes = Uint8Array.from(files[path]!)
  bytes[bytes.length - 1]! ^= 1
  return zipSync({ ...files, [path]: bytes }, { level: 1 })
}

interface Watched {
  progressSeen: string[]
}

/** In the page: keeps the titles of every bar of progress that it shows from now on. */
function watchProgress(): void {
  const seen: string[] = []
  ;(globalThis as unknown as Watched).progressSeen = seen
  new MutationObserver(() => {
    for (const bar of document.querySelectorAll('[role=progressbar]'))
      seen.push(document.getElementById(bar.getAttribute('aria-labelledby')!)!.textContent)
  }).observe(document.body, { childList: true, subtree: true })
}

/** How an import says what lines of the table say: problems, machines, embeddings and run sheets. */
function wordsOf(lines: readonly string[]): string {
  const things = ['problem', 'machine', 'embedding', 'run sheet']
  const counts = lines.slice(1).map((line) => line.split('\t').at(-1)!.trim())
  return things.map((thing, k) => `${counts[k]} ${thing}${counts[k] === '1' ? '' : 's'}`).join(', ')
}
