import type { Page } from 'playwright-core'
import { twoFrames } from './checks'

/** Names of all themes that the style sheets of the page know, light first: whatever `data-theme` may be. */
export async function themesOf(page: Page): Promise<string[]> {
  const named = await page.evaluate(() => {
    const rules = [...document.styleSheets].flatMap((sheet) => [...sheet.cssRules])
    const text = rules.map((rule) => rule.cssText).join('\n')
    return [...text.matchAll(/\[data-theme=["']?([\w-]+)["']?\]/g)].map(([, name]) => name!)
  })
  return [...new Set(['light', 'dark', ...named])]
}

/** Puts a theme on the page as it stands. */
export async function wear(page: Page, theme: string): Promise<void> {
  await page.evaluate((name) => document.documentElement.setAttribute('data-theme', name), theme)
  await twoFrames(page)
}
