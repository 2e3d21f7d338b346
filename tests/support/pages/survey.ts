import type { Browser, BrowserContext, Page } from 'playwright-core'
import { watchPage } from '../browser'
import type { Client } from '../client'
import { NARROW, naming, openNarrowMenu, settled, sideways, unfold, violations, WIDE } from './checks'
import type { View } from './crawl'
import type { SeenLooks } from './looks'
import { colourProblems } from './looks'
import type { Opened } from './popups'
import { lookAtPopups } from './popups'
import { themesOf, wear } from './themes'

/** What is looked for on a page. */
export type Aspect = 'naming' | 'accessibility' | 'popups' | 'width' | 'console'

export interface Finding {
  readonly pattern: string
  readonly aspect: Aspect
  readonly problem: string
  /** Address, person, and state of the page. */
  readonly where: string
}

/** One line for each problem of a page, with the first place that has it. */
export function summaryOf(findings: readonly Finding[], pattern: string, aspect: Aspect): string[] {
  const places = new Map<string, string[]>()
  for (const finding of findings.filter((one) => one.pattern === pattern && one.aspect === aspect))
    places.set(finding.problem, [...(places.get(finding.problem) ?? []), finding.where])
  return [...places].map(([problem, [first, ...more]]) => {
    const others = more.length > 0 ? ` and ${more.length} more` : ''
    return `${problem} (${first}${others})`
  })
}

/** Pages looked at side by side: waiting for one leaves time for the others. */
const AT_ONCE = 3

/** What needs no second look. */
export interface Known {
  readonly opened: Opened
  readonly seen: SeenLooks
  /** Patterns of pages of which all texts of one view were looked at. */
  readonly patterns: Set<string>
}

export const nothingKnown = (): Known => ({ opened: new Set(), seen: new Set(), patterns: new Set() })

/** Opens every view in a browser of its person and says what is wrong with it; `known` is added to. */
export async function survey(browser: Browser, views: readonly View[], known: Known): Promise<Finding[]> {
  const findings: Finding[] = []
  const waiting = [...views]
  const worker = async (): Promise<void> => {
    const desks = new Map<Client, Desk>()
    for (let view = waiting.shift(); view; view = waiting.shift()) {
      const desk = desks.get(view.client) ?? (await openDesk(browser, view))
      desks.set(view.client, desk)
      findings.push(...(await lookAt(desk, view, known)))
    }
    await Promise.all([...desks.values()].map(({ page }) => page.context().close()))
  }
  await Promise.all(Array.from({ length: AT_ONCE }, worker))
  return findings
}

/** A window of the view's person, calm and light, as wide as a desk's. */
export async function openWindow(browser: Browser, { client }: Pick<View, 'client'>): Promise<BrowserContext> {
  const context = await browser.newContext({ viewport: WIDE, reducedMotion: 'reduce', colorScheme: 'light' })
  await context.addCookies(client.browserCookies())
  return context
}

/** One page of one person that goes from view to view: scripts once fetched and compiled stay so. */
interface Desk {
  readonly page: Page
  /** What the view that is open complained about. */
  readonly complaints: string[]
}

async function openDesk(browser: Browser, view: View): Promise<Desk> {
  const page = await (await openWindow(browser, view)).newPage()
  return { page, complaints: watchPage(page, view.client.url) }
}

/** The next view begins as on the first visit, with nothing remembered of the one before. */
async function goTo({ page, complaints }: Desk, address: string): Promise<void> {
  await page.evaluate(() => (localStorage.clear(), sessionStorage.clear())).catch(() => undefined)
  await page.setViewportSize(WIDE)
  await page.goto('about:blank')
  complaints.length = 0
  await page.goto(address)
  await settled(page)
}

async function lookAt(desk: Desk, view: View, { opened, seen, patterns }: Known): Promise<Finding[]> {
  const { route, path, person, client, headings } = view
  const { page, complaints } = desk
  const findings: Finding[] = []
  const add = (aspect: Aspect, problems: string[], how = ''): void => {
    const where = `${path} as ${person ?? 'a stranger'}${how}`
    for (const problem of problems) findings.push({ pattern: route.pattern, aspect, problem, where })
  }
  if (headings !== 1) add('naming', [`${headings} headings of the first level`], ' as served')
  try {
    await goTo(desk, client.url + path)
    add('naming', await naming(page))
    await unfold(page)
    const themes = await themesOf(page)
    const isFirst = !patterns.has(route.pattern)
    patterns.add(route.pattern)
    add('accessibility', await violations(page, isFirst ? 'all' : 'all but colours'))
    for (const { theme, problem } of await colourProblems(page, { themes, seen }))
      add('accessibility', [problem], `, ${theme}`)
    if (isFirst) for (const theme of ['dark', 'light']) await wear(page, theme)
    add('popups', await lookAtPopups(page, { pattern: route.pattern, themes, opened, seen }))
    await page.setViewportSize(NARROW)
    await openNarrowMenu(page)
    add('width', await sideways(page))
    // What a narrow page hides, shows or turns round is the same in all views of one pattern.
    if (isFirst) add('accessibility', await violations(page, 'all but colours'), ', narrow')
  } catch (error) {
    add('console', [(error instanceof Error ? error.message : String(error)).split('\n')[0]!])
  }
  add('console', complaints)
  return findings
}
