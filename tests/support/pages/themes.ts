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

/**
 * Colours the page as in a theme, without telling its scripts: drawings, in which axe-core finds nothing, are not painted
 * anew. The rules of the theme apply to whatever theme is worn, as strong and later than before; null takes them away.
 */
export async function tint(page: Page, theme: string | null): Promise<void> {
  await page.evaluate((name) => {
    const named = new RegExp(`\\[data-theme=["']?${name}["']?\\]`, 'g')
    const textsIn = (rules: CSSRuleList): string[] =>
      [...rules].flatMap((rule) => {
        if (rule instanceof CSSMediaRule) return matchMedia(rule.media.mediaText).matches ? textsIn(rule.cssRules) : []
        const { cssText } = rule
        return cssText.search(named) < 0 ? [] : [cssText.replaceAll(named, ':root')]
      })
    const sheet = new CSSStyleSheet()
    if (name !== null) sheet.replaceSync([...document.styleSheets].flatMap((one) => textsIn(one.cssRules)).join('\n'))
    document.adoptedStyleSheets = [sheet]
  }, theme)
  await twoFrames(page)
}
