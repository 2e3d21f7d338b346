import type { Browser } from 'playwright-core'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launch } from '../support/browser'
import { startDemo } from '../support/demo'
import { emptyFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import type { DeadLink, Shown } from '../support/pages/crawl'
import { crawl, tellingViews } from '../support/pages/crawl'
import { findRoutes } from '../support/pages/routes'
import { prepareRunning, prepareStates } from '../support/pages/states'
import type { Aspect, Finding } from '../support/pages/survey'
import { nothingKnown, summaryOf, survey } from '../support/pages/survey'
import { demoVisitors, exploreAs, startBare } from '../support/pages/worlds'

/*
 * Every page of the product, found by itself: the fixed ones from the folder of pages, examples of the others by
 * following links as each of the demo's people, in a workspace that holds nothing, and before there is one. Of the
 * views that are made of the same parts one is looked at.
 */

const routes = findRoutes(fileURLToPath(new URL('../../pages', import.meta.url)))

let browser: Browser
const servers: RunningServer[] = []
const shown: Shown = new Map()
const dead: DeadLink[] = []
const findings: Finding[] = []
const known = nothingKnown()

beforeAll(async () => {
  browser = await launch()
  const bare = startBare(emptyFolder())
  await lookAtDemo()
  await lookAtBare(await bare)
}, 900_000)
afterAll(async () => {
  await browser?.close()
  await Promise.all(servers.map((server) => server.stop()))
})

async function lookAtDemo(): Promise<void> {
  const server = await startDemo()
  servers.push(server)
  await prepareStates(server.url)
  const visitors = await demoVisitors(server.url)
  await lookAs(visitors)
  const running = await prepareRunning(server.url)
  const { views } = await crawl(routes, visitors[0]!, running.paths, () => false)
  findings.push(...(await survey(browser, tellingViews(views, shown), known)))
  await running.stop()
}

async function lookAtBare({ server, stranger, setUp }: Awaited<ReturnType<typeof startBare>>): Promise<void> {
  servers.push(server)
  await lookAs([stranger])
  await lookAs([await setUp()])
}

async function lookAs(visitors: Parameters<typeof exploreAs>[1]): Promise<void> {
  const found = await exploreAs(routes, visitors, shown)
  dead.push(...found.dead)
  findings.push(...(await survey(browser, found.views, known)))
}

describe.each(routes)('page $pattern', ({ pattern, file }) => {
  const about = (aspect: Aspect): string[] => summaryOf(findings, pattern, aspect)

  it('is found', () => {
    expect(
      shown.has(pattern),
      `no address of pages/${file} was found: nothing links to one. Link to it from a page, or bring the demo workspace into a state that does (tests/support/pages/states.ts).`,
    ).toBe(true)
  })
  it('has one first heading and a title', () => expect(about('naming')).toEqual([]))
  it('has no violation that axe-core finds, in any theme, wide and narrow', () =>
    expect(about('accessibility')).toEqual([]))
  it('opens menus, dialogs and explanations by key, without a violation, and gives the focus back', () =>
    expect(about('popups')).toEqual([]))
  it('never scrolls sideways, 360 px wide', () => expect(about('width')).toEqual([]))
  it('leaves the console empty', () => expect(about('console')).toEqual([]))
})

it('links nowhere but to pages that are there', () => expect(dead).toEqual([]))
