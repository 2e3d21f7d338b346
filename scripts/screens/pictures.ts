import { join } from 'node:path'
import type { Browser } from 'playwright-core'
import type { View } from '../../tests/support/pages/crawl'
import { settled, twoFrames } from '../../tests/support/pages/checks'
import { openWindow } from '../../tests/support/pages/survey'
import { wear } from '../../tests/support/pages/themes'

export interface Picture {
  /** Pictures under one heading belong together. */
  readonly heading: string
  readonly group: string
  readonly caption: string
  readonly file: string
}

const SIZES = { wide: { width: 1440, height: 900 }, narrow: { width: 390, height: 844 } }
const THEMES = ['light', 'dark']

let taken = 0

/** The whole page in each size and theme. */
export async function takePictures(browser: Browser, folder: string, view: View): Promise<Picture[]> {
  const { route, path, person, client } = view
  const context = await openWindow(browser, view)
  const page = await context.newPage()
  const pictures: Picture[] = []
  const number = String(++taken).padStart(2, '0')
  const name = route.pattern === '/' ? 'problems' : route.pattern.replace(/\W+/g, '-').replace(/^-|-$/g, '')
  await page.goto(client.url + path)
  await settled(page)
  for (const [size, viewport] of Object.entries(SIZES)) {
    await page.setViewportSize(viewport)
    for (const theme of THEMES) {
      await wear(page, theme)
      await settled(page)
      await page.waitForTimeout(400)
      await twoFrames(page)
      const file = `${number}-${name}-${person?.replace(/\W/g, '-') ?? 'stranger'}-${size}-${theme}.png`
      await page.screenshot({ path: join(folder, file), fullPage: true })
      pictures.push({
        heading: route.pattern,
        group: `${path} as ${person ?? 'a stranger'}`,
        caption: `${size}, ${theme}`,
        file,
      })
    }
  }
  await context.close()
  console.log(`${number} ${route.pattern} as ${person ?? 'a stranger'}`)
  return pictures
}
