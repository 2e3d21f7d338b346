import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import type axe from 'axe-core'
import type { Page } from 'playwright-core'

const AXE = readFileSync(createRequire(import.meta.url).resolve('axe-core/axe.min.js'), 'utf8')
/** WCAG 2.2 A and AA, and what axe-core calls good practice. */
const TAGS = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice']

/** A narrow telephone, in CSS pixels: nothing may have to be scrolled sideways on it. */
export const NARROW = { width: 360, height: 780 }
export const WIDE = { width: 1280, height: 900 }

declare global {
  interface Window {
    axe: typeof axe
    chosenTexts: Element[]
  }
}

/** Waits until the page is hydrated, nothing of it is still being loaded, and fonts are there. */
export async function settled(page: Page): Promise<void> {
  await page.waitForFunction(() => window.useNuxtApp?.().isHydrating === false)
  // Parts whose code is fetched on its own. Pages of running work hold a connection and are never quiet.
  await page.waitForLoadState('networkidle', { timeout: 3000 }).catch(() => undefined)
  await loaded(page)
  await page.evaluate(() => document.fonts.ready.then(() => window.scrollTo(0, 0)))
  await twoFrames(page)
}

/** Waits for what says that it is busy; some parts are loaded once they come into view. */
async function loaded(page: Page): Promise<void> {
  await page.waitForFunction(() => {
    const waiting = [...document.querySelectorAll('main [aria-busy="true"]')]
    const busy = waiting.find((part) => part.checkVisibility())
    busy?.scrollIntoView({ block: 'center' })
    return !busy
  })
}

/** What was changed is laid out and painted after this. */
export async function twoFrames(page: Page): Promise<void> {
  await page.evaluate(() => new Promise((done) => requestAnimationFrame(() => requestAnimationFrame(done))))
}

/** Opens whatever is folded in the main part and is no menu, so that it is checked too. */
export async function unfold(page: Page): Promise<void> {
  await page.evaluate(() => {
    for (const details of document.querySelectorAll<HTMLDetailsElement>('main details:not([open])')) details.open = true
    const folded = 'main button[aria-expanded="false"]:not([aria-haspopup]):not(:disabled)'
    for (const button of document.querySelectorAll<HTMLButtonElement>(folded)) button.click()
  })
  await twoFrames(page)
  await loaded(page)
}

/** Unfolds what the page puts behind a button when it is narrow: the way to the other pages. */
export async function openNarrowMenu(page: Page): Promise<void> {
  await twoFrames(page)
  await page.evaluate(() => {
    const folded = document.querySelectorAll<HTMLButtonElement>('header button[aria-expanded="false"]')
    for (const button of folded) if (button.checkVisibility() && !button.ariaHasPopup) button.click()
  })
  await twoFrames(page)
}

/** Rules about colours, the only ones that a theme can break. */
const COLOUR_RULES = ['color-contrast', 'link-in-text-block']

/** Violations on the page or in some of its parts, each with the first places that show it. */
export async function violations(
  page: Page,
  about: 'all' | 'colours' | 'all but colours' = 'all',
  within?: string,
): Promise<string[]> {
  if (!(await page.evaluate(() => 'axe' in window))) await page.evaluate(AXE)
  const without = Object.fromEntries(COLOUR_RULES.map((rule) => [rule, { enabled: about === 'all' }]))
  const options: axe.RunOptions = {
    resultTypes: ['violations'],
    ...(about === 'colours'
      ? { runOnly: { type: 'rule', values: COLOUR_RULES } }
      : { runOnly: { type: 'tag', values: TAGS }, rules: without }),
  }
  if (about === 'colours') await chooseTexts(page, within)
  return page.evaluate(
    async ({ asked, where, isChosen }) => {
      const include = isChosen ? window.chosenTexts : where ? [where] : [document]
      if (include.length === 0) return []
      const { violations: found } = await window.axe.run({ include }, asked)
      return found.map(({ id, help, nodes }) => {
        const places = nodes.slice(0, 3).map(({ target, any }) => `${target.join(' ')} (${any[0]?.message ?? ''})`)
        return `${id}: ${help}, ${nodes.length}×: ${places.join('; ')}`
      })
    },
    { asked: options, where: within, isChosen: about === 'colours' },
  )
}

/**
 * Leaves on the window one of all texts that have the same colours: their own, and those of everything they stand on.
 * A table of a thousand rows is three or four of them.
 */
async function chooseTexts(page: Page, within = 'body'): Promise<void> {
  await page.evaluate((where) => {
    const stacks = new Map<Element, string>()
    const stackOf = (element: Element): string => {
      const known = stacks.get(element)
      if (known !== undefined) return known
      const style = getComputedStyle(element)
      const own = [style.color, style.backgroundColor, style.backgroundImage, style.opacity, style.position]
      const beneath = element.parentElement ? stackOf(element.parentElement) : ''
      // What paints nothing of its own changes nothing.
      const stack = beneath.endsWith(own.join()) ? beneath : `${beneath} > ${own.join()}`
      stacks.set(element, stack)
      return stack
    }
    const chosen = new Map<string, Element>()
    for (const element of document.querySelectorAll(`:is(${where}), :is(${where}) *`)) {
      const hasText = [...element.childNodes].some(
        (node) => node.nodeType === Node.TEXT_NODE && node.textContent?.trim(),
      )
      if (!hasText && !element.matches('input, textarea, select')) continue
      const { fontSize, fontWeight, textDecorationLine } = getComputedStyle(element)
      const looks = [element.tagName, fontSize, fontWeight, textDecorationLine, stackOf(element)].join()
      if (!chosen.has(looks) && element.checkVisibility()) chosen.set(looks, element)
    }
    window.chosenTexts = [...chosen.values()]
  }, within)
}

/** Elements that reach over the right edge where the page has to be scrolled sideways; none where it has not. */
export async function sideways(page: Page): Promise<string[]> {
  return page.evaluate(() => {
    const root = document.documentElement
    if (root.scrollWidth <= root.clientWidth) return []
    const scrolls = (element: Element): boolean => {
      for (let up = element.parentElement; up && up !== document.body; up = up.parentElement)
        if (getComputedStyle(up).overflowX !== 'visible') return true
      return false
    }
    const over = [...document.body.querySelectorAll('*')].filter(
      (element) => element.getBoundingClientRect().right > root.clientWidth + 0.5 && !scrolls(element),
    )
    const names = over.slice(-4).map((element) => {
      const { width, right } = element.getBoundingClientRect()
      return `<${element.tagName.toLowerCase()} class="${element.getAttribute('class') ?? ''}"> ${Math.round(width)} wide, to ${Math.round(right)}`
    })
    return [`${root.scrollWidth} px wide on ${root.clientWidth}: ${names.join('; ')}`]
  })
}

/** One visible first heading, and a title that names the page. */
export async function naming(page: Page): Promise<string[]> {
  const { title, headings } = await page.evaluate(() => ({
    title: document.title,
    headings: [...document.querySelectorAll('h1')].filter((h1) => h1.checkVisibility()).length,
  }))
  const complaints = headings === 1 ? [] : [`${headings} headings of the first level`]
  return /^\S.* · Espalier$/.test(title) ? complaints : [...complaints, `the title is “${title}”`]
}
