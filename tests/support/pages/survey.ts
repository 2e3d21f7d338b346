import type { Browser, BrowserContext } from 'playwright-core'
import { watchPage } from '../browser'
import { NARROW, naming, settled, sideways, twoFrames, unfold, violations, WIDE } from './checks'
import type { View } from './crawl'
import { themesOf, wear } from './themes'

/** What is looked for on a page. */
export type Aspect = 'naming' | 'accessibility' | 'width' | 'console'

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

/** Opens every view in a browser of its person and says what is wrong with it. */
export async function survey(browser: Browser, views: readonly View[]): Promise<Finding[]> {
  const findings: Finding[] = []
  const waiting = [...views]
  const worker = async (): Promise<void> => {
    for (let view = waiting.shift(); view; view = waiting.shift()) findings.push(...(await lookAt(browser, view)))
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

async function lookAt(browser: Browser, view: View): Promise<Finding[]> {
  const { route, path, person, client, headings } = view
  const findings: Finding[] = []
  const add = (aspect: Aspect, problems: string[], how = ''): void => {
    const where = `${path} as ${person ?? 'a stranger'}${how}`
    for (const problem of problems) findings.push({ pattern: route.pattern, aspect, problem, where })
  }
  if (headings !== 1) add('naming', [`${headings} headings of the first level`], ' as served')
  const context = await openWindow(browser, view)
  const page = await context.newPage()
  const complaints = watchPage(page, client.url)
  try {
    await page.goto(client.url + path)
    await settled(page)
    add('naming', await naming(page))
    await unfold(page)
    add('accessibility', await violations(page))
    for (const theme of (await themesOf(page)).filter((name) => name !== 'light')) {
      await wear(page, theme)
      add('accessibility', await violations(page, 'colours'), `, ${theme}`)
    }
    await page.setViewportSize(NARROW)
    await twoFrames(page)
    add('width', await sideways(page))
    add('accessibility', await violations(page, 'all but colours'), ', narrow')
  } catch (error) {
    add('console', [error instanceof Error ? error.message : String(error)])
  }
  add('console', complaints)
  await context.close()
  return findings
}
