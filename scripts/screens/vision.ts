import { join } from 'node:path'
import type { Browser, Page } from 'playwright-core'
import { settled, WIDE } from '../../tests/support/pages/checks'
import type { Route } from '../../tests/support/pages/routes'
import { openWindow } from '../../tests/support/pages/survey'
import { wear } from '../../tests/support/pages/themes'
import { demoVisitors, exploreAs } from '../../tests/support/pages/worlds'
import type { Picture } from './pictures'

const LENSES = ['Occupancy', 'Load', 'Breaks']
/** Chromium's own simulations, applied to what it paints. */
const VISIONS = ['none', 'protanopia', 'deuteranopia', 'tritanopia', 'achromatopsia'] as const

/** The lattice through each lens as seen with each deficiency, on the first embedding that has all three. */
export async function takeLenses(
  browser: Browser,
  folder: string,
  routes: readonly Route[],
  url: string,
): Promise<Picture[]> {
  const visitors = (await demoVisitors(url)).slice(0, 1)
  const { views } = await exploreAs(routes, visitors)
  for (const view of views.filter(({ route }) => route.pattern === '/embeddings/:id')) {
    const context = await openWindow(browser, view)
    const page = await context.newPage()
    await page.setViewportSize({ ...WIDE, width: 1440 })
    await page.goto(url + view.path)
    await settled(page)
    const pictures = (await hasAllLenses(page)) ? await lensesOf(page, folder) : []
    await context.close()
    if (pictures.length > 0) return pictures
  }
  throw new Error('no embedding of the demo has all three lenses')
}

async function hasAllLenses(page: Page): Promise<boolean> {
  const lens = page.getByRole('radio', { name: 'Breaks' })
  return (await lens.count()) === 1 && lens.isEnabled()
}

async function lensesOf(page: Page, folder: string): Promise<Picture[]> {
  const devtools = await page.context().newCDPSession(page)
  const pictures: Picture[] = []
  for (const lens of LENSES) {
    await page.getByRole('radio', { name: lens }).click()
    for (const theme of ['light', 'dark']) {
      await wear(page, theme)
      for (const type of VISIONS) {
        await devtools.send('Emulation.setEmulatedVisionDeficiency', { type })
        await page.waitForTimeout(400)
        const file = `${lens.toLowerCase()}-${theme}-${type}.png`
        await page.locator('main').screenshot({ path: join(folder, file) })
        pictures.push({ heading: lens, group: `${lens}, ${theme}`, caption: type, file })
      }
    }
  }
  return pictures
}
