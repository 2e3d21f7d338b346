import { fileURLToPath } from 'node:url'
import { gzipSync } from 'node:zlib'
import type { Browser } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launch } from '../support/browser'
import { Client } from '../support/client'
import { startDemo } from '../support/demo'
import { settled } from '../support/pages/checks'
import { findRoutes } from '../support/pages/routes'
import { openWindow } from '../support/pages/survey'
import type { RunningServer } from '../support/server'

/* What a browser fetches of the product's own code, prefetched code included, as a server sends it with gzip. */

const BUDGET = 200_000
/** Texts that a build leaves in place, by what they belong to. */
const MARKS = { 'the graph library': 'Sigma: ', 'the chart library': 'Canvas is already in use. Chart with ID' }

const fixed = findRoutes(fileURLToPath(new URL('../../pages', import.meta.url))).filter(({ isDynamic }) => !isDynamic)

let server: RunningServer
let browser: Browser
let developer: Client
let embeddingId: string

beforeAll(async () => {
  server = await startDemo()
  browser = await launch()
  developer = await Client.signedIn(server.url, 'developer')
  const { items } = (await developer.get<{ items: { embedding: { id: string } | null }[] }>('/api/problems')).body
  embeddingId = items.find(({ embedding }) => embedding)!.embedding!.id
})
afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

interface Loaded {
  readonly bytes: number
  readonly code: string
}

async function load(path: string, client: Client): Promise<Loaded> {
  const context = await openWindow(browser, { client })
  const page = await context.newPage()
  const files = new Map<string, Promise<Buffer>>()
  page.on('response', (response) => {
    const url = response.url()
    if (/\.m?js(\?|$)/.test(url) && !files.has(url)) files.set(url, response.body())
  })
  await page.goto(server.url + path)
  await settled(page)
  await page.waitForLoadState('networkidle')
  const bodies = await Promise.all(files.values())
  await context.close()
  return {
    bytes: bodies.reduce((sum, body) => sum + gzipSync(body).length, 0),
    code: bodies.map(String).join('\n'),
  }
}

const librariesIn = ({ code }: Loaded): string[] =>
  Object.entries(MARKS).flatMap(([name, mark]) => (code.includes(mark) ? [name] : []))

describe('code for the browser', () => {
  it('is less than 200 kB for somebody who is not signed in', async () => {
    const loaded = await load('/sign-in', new Client(server.url))
    expect(loaded.bytes).toBeGreaterThan(20_000)
    expect(loaded.bytes).toBeLessThan(BUDGET)
    expect(librariesIn(loaded)).toEqual([])
  })

  it.each(fixed)('is less than 200 kB for $pattern, without what only draws', async ({ pattern }) => {
    const loaded = await load(pattern, developer)
    expect(loaded.bytes).toBeGreaterThan(20_000)
    expect(loaded.bytes).toBeLessThan(BUDGET)
    expect(librariesIn(loaded)).toEqual([])
  })

  it('brings what draws where a lattice and charts are shown', async () => {
    expect(librariesIn(await load(`/embeddings/${embeddingId}`, developer))).toEqual(Object.keys(MARKS))
  })
})
