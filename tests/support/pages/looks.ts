import type { Page } from 'playwright-core'
import { colourViolations } from './checks'
import { tint } from './themes'

/**
 * Looks of texts that were checked in every theme. Colours follow from what an element and those around it are, so of
 * all texts that are made alike one is enough, on whatever page it was.
 */
export type SeenLooks = Set<string>

/**
 * What the rules about colours find on texts whose looks are new, in each of the themes.
 */
export async function colourProblems(
  page: Page,
  { themes, seen, within = 'body' }: { themes: readonly string[]; seen: SeenLooks; within?: string },
): Promise<{ theme: string; problem: string }[]> {
  const fresh = await chooseTexts(page, within, seen)
  if (fresh.length === 0) return []
  const problems: { theme: string; problem: string }[] = []
  for (const theme of themes) {
    await tint(page, theme === 'light' ? null : theme)
    problems.push(...(await colourViolations(page)).map((problem) => ({ theme, problem })))
  }
  await tint(page, null)
  const stayed = await page.evaluate(() => window.chosenTexts.map((text) => text.isConnected))
  for (const [at, look] of fresh.entries()) if (stayed[at]) seen.add(look)
  return problems
}

/** Leaves on the window one text of each look that is new, and answers these looks in the same order. */
async function chooseTexts(page: Page, within: string, seen: SeenLooks): Promise<string[]> {
  const looks = await page.evaluate(looksOf, within)
  const fresh = looks.filter((look) => !seen.has(look))
  await page.evaluate((wanted) => {
    const all = window.chosenByLook
    window.chosenTexts = wanted.map((look) => all.get(look)!)
  }, fresh)
  return fresh
}

/**
 * Runs in the page. A look is what a style sheet can tell a text and everything around it by, with the colours that it
 * has now: those tell apart what only its place among others does, as in the first column of a table.
 */
function looksOf(within: string): string[] {
  const telling =
    /^(?:class|type|role|open|hidden|disabled|data-(?:v-.*|state|disabled|highlighted|place|tool)|aria-(?:current|selected|invalid|disabled|expanded|pressed|checked|sort))$/
  // Of styles of its own, only what colours: places and widths differ from row to row.
  const colouring = (style: string): string[] => style.split(';').filter((one) => /color|background|fill|--/.test(one))
  const looks = new Map<Element, string>()
  const lookOf = (element: Element): string => {
    const known = looks.get(element)
    if (known !== undefined) return known
    const style = getComputedStyle(element)
    const named = [...element.attributes].filter(({ name }) => telling.test(name))
    const own = [
      element.tagName,
      ...named.map(({ name, value }) => `${name}=${value}`),
      ...colouring(element.getAttribute('style') ?? ''),
      ...[style.color, style.backgroundColor, style.backgroundImage, style.opacity, style.textDecorationLine],
      ...[style.fontSize, style.fontWeight],
    ]
    const look = `${element.parentElement ? lookOf(element.parentElement) : ''} > ${own.join()}`
    looks.set(element, look)
    return look
  }
  window.chosenByLook = new Map()
  for (const element of document.querySelectorAll(`:is(${within}), :is(${within}) *`)) {
    const hasText = [...element.childNodes].some((node) => node.nodeType === Node.TEXT_NODE && node.textContent?.trim())
    if (!hasText && !element.matches('input, textarea, select')) continue
    if (element.checkVisibility() && !window.chosenByLook.has(lookOf(element)))
      window.chosenByLook.set(lookOf(element), element)
  }
  return [...window.chosenByLook.keys()]
}
