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
    /** Visible texts, one of each look, and those of them to be checked: see looks.ts. */
    chosenByLook: Map<string, Element>
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

/** Runs axe-core; each violation with the first places that show it. */
async function axeOn(page: Page, asked: axe.RunOptions, where: string | undefined, isChosen: boolean) {
  if (!(await page.evaluate(() => 'axe' in window))) await page.evaluate(AXE)
  return page.evaluate(
    async ({ options, within, chosen }) => {
      // A text may have been drawn anew since it was chosen, as while a picture is being painted.
      const include = chosen ? window.chosenTexts.filter((text) => text.isConnected) : within ? [within] : [document]
      if (include.length === 0) return []
      const { violations: found } = await window.axe.run({ include }, { ...options, resultTypes: ['violations'] })
      return found.map(({ id, help, nodes }) => {
        const places = nodes.slice(0, 3).map(({ target, any }) => `${target.join(' ')} (${any[0]?.message ?? ''})`)
        return `${id}: ${help}, ${nodes.length}×: ${places.join('; ')}`
      })
    },
    { options: asked, within: where, chosen: isChosen },
  )
}

/** Violations on the page or in some of its parts. */
export async function violations(page: Page, about: 'all' | 'all but colours' = 'all', within?: string) {
  const rules = Object.fromEntries(COLOUR_RULES.map((rule) => [rule, { enabled: about === 'all' }]))
  return axeOn(page, { runOnly: { type: 'tag', values: TAGS }, rules }, within, false)
}

/** Violations of the rules about colours by the texts that `chooseTexts` left on the window. */
export const colourViolations = (page: Page): Promise<string[]> =>
  axeOn(page, { runOnly: { type: 'rule', values: COLOUR_RULES } }, undefined, true)

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
