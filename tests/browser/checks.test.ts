import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { launch, watchPage } from '../support/browser'
import { NARROW, naming, sideways, violations } from '../support/pages/checks'
import { colourProblems } from '../support/pages/looks'
import { themesOf } from '../support/pages/themes'

/* The checks of pages.test.ts on pages with known faults: each must be found, and nothing else. */

const page = (main: string, title = 'Fine · Espalier', style = '') =>
  `<!doctype html><html lang="en"><head><title>${title}</title><style>html { background: #fff; color: #222 } ${style}</style></head><body><main>${main}</main></body></html>`
const FINE = page('<h1>Fine</h1><p>Nothing is wrong here.</p>')

let browser: Browser
let tab: Page

beforeAll(async () => {
  browser = await launch()
  tab = await browser.newPage({ viewport: NARROW })
})
afterAll(() => browser?.close())

describe('naming', () => {
  it.each([
    [FINE, []],
    [page('<h1>One</h1><h1>Two</h1>'), ['2 headings of the first level']],
    [page('<h1 hidden>Hidden</h1>'), ['0 headings of the first level']],
    [page('<h1>Fine</h1>', 'Espalier'), ['the title is “Espalier”']],
  ])('%#', async (html, expected) => {
    await tab.setContent(html)
    expect(await naming(tab)).toEqual(expected)
  })
})

describe('violations', () => {
  const ids = (found: string[]) => found.map((text) => text.split(':')[0])

  it.each([
    [FINE, []],
    [page('<h1>Fine</h1><img src="data:,">'), ['image-alt']],
    [page('<h1>Fine</h1><h3>Two levels further</h3>'), ['heading-order']],
    [page('<h1>Fine</h1><p style="color: #bbb">Pale</p>'), ['color-contrast']],
    [
      page('<h1>Fine</h1><button style="font-size: 4px">a</button><button style="font-size: 4px">b</button>'),
      ['target-size'],
    ],
    [page('<h1>Fine</h1>').replaceAll('main>', 'div>'), ['landmark-one-main', 'region']],
  ])('%#', async (html, expected) => {
    await tab.setContent(html)
    expect(ids(await violations(tab))).toEqual(expected)
  })

  /** Theme and rule of what the rules about colours find. */
  const problemsIn = async (themes: string[], seen: Set<string> = new Set()) =>
    (await colourProblems(tab, { themes, seen })).map(({ theme, problem }) => `${theme} ${ids([problem])[0]}`)

  it('in a theme that only its name brings out', async () => {
    const style = `@media screen { :root[data-theme='night'] p { color: #333; background: #222 } }`
    await tab.setContent(page('<h1>Fine</h1><p>Unreadable by night.</p>', undefined, style))
    expect(await themesOf(tab)).toEqual(['light', 'dark', 'night'])
    expect(ids(await violations(tab))).toEqual([])
    expect(await problemsIn(['light', 'night'])).toEqual(['night color-contrast'])
    expect(ids(await violations(tab, 'all but colours'))).toEqual([])
  })

  it('by colour once for all texts that are made alike', async () => {
    const style = `td, td + td + td { color: #bbb } td + td { color: #222 } .dim { color: #ccc }`
    const seen = new Set<string>()
    await tab.setContent(
      page('<h1>Fine</h1><table><tr><td>pale<td>dark<td>pale<tr><td>pale<td>dark</table>', undefined, style),
    )
    const found = await colourProblems(tab, { themes: ['light'], seen })
    expect(found.map(({ problem }) => problem)).toEqual([expect.stringMatching(/^color-contrast: .*, 1×: .*td/)])
    expect(await problemsIn(['light'], seen)).toEqual([])
    await tab.setContent(page('<h1>Fine</h1><table><tr><td>pale<td class="dim">dim</table>', undefined, style))
    expect(await problemsIn(['light'], seen)).toEqual(['light color-contrast'])
  })
})

describe('sideways', () => {
  it.each([
    [FINE, []],
    [page('<h1>Fine</h1><div style="overflow: auto"><div style="width: 900px">Scrolls inside</div></div>'), []],
    [
      page('<h1>Fine</h1><div class="wide" style="width: 400px">Too wide</div>'),
      [/^\d+ px wide on 360: .*class="wide"/],
    ],
  ])('%#', async (html, expected) => {
    await tab.setContent(html)
    const found = await sideways(tab)
    expect(found).toHaveLength(expected.length)
    expected.forEach((pattern, i) => expect(found[i]).toMatch(pattern))
  })
})

it('console: errors, warnings, uncaught errors and foreign requests', async () => {
  const other = await browser.newPage()
  const complaints = watchPage(other, 'http://127.0.0.1')
  await other.evaluate(() => {
    console.log('not a complaint')
    console.warn('careful')
    console.error('wrong')
    setTimeout(() => {
      throw new Error('thrown')
    })
    return fetch('http://127.0.0.2:9/').catch(() => undefined)
  })
  await expect.poll(() => complaints.length).toBeGreaterThanOrEqual(4)
  expect(complaints).toContain('warning: careful')
  expect(complaints).toContain('error: wrong')
  expect(complaints).toContain('uncaught: thrown')
  expect(complaints).toContain('request to another host: http://127.0.0.2:9/')
})
