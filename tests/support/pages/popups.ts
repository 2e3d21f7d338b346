import type { ElementHandle, Page } from 'playwright-core'
import { twoFrames, violations } from './checks'
import type { SeenLooks } from './looks'
import { colourProblems } from './looks'

/** What opens a menu, a dialog, an explanation or a list of answers, and can be reached now. */
const TRIGGERS = '[aria-haspopup]:not([aria-haspopup="false"]):not([role="menuitem"])'
/** Entries of an open menu that lead to a dialog. */
const LEADING = '[role="menuitem"][aria-haspopup]'
const POPUPS = '[role="dialog"], [role="alertdialog"], [role="menu"], [role="listbox"]'
/** Typed into a box of answers until it has some. */
const TYPED = ['1', 'a', 'e']
const PATIENCE = { timeout: 3000 }

/** Tells what was looked at from what it was found on, so that each kind of popup is opened once on each page. */
export type Opened = Set<string>

type Trigger = ElementHandle<HTMLElement>

/** What is known while the popups of a page are looked at. */
interface PopupsOf {
  readonly pattern: string
  readonly themes: readonly string[]
  readonly opened: Opened
  readonly seen: SeenLooks
}

/**
 * Opens one popup of each kind with the keyboard, looks at it in every theme, closes it with Escape, and says what is
 * wrong with it. Menus and dialogs are of one kind when their triggers read the same, explanations of numbers always;
 * those outside the main part are the same on every page.
 */
export async function lookAtPopups(page: Page, about: PopupsOf) {
  const { pattern, opened } = about
  const problems: string[] = []
  for (const { trigger, kind, isShared } of await triggersOf(page)) {
    const key = isShared ? kind : `${pattern} ${kind}`
    if (opened.has(key)) continue
    opened.add(key)
    const found = await lookAt(page, trigger, about).catch((error: Error) => [error.message.split('\n')[0]!])
    problems.push(...found.map((problem) => `${problem}, opened by ${kind}`))
  }
  return problems
}

async function triggersOf(page: Page): Promise<{ trigger: Trigger; kind: string; isShared: boolean }[]> {
  const handles = (await page.$$(TRIGGERS)) as Trigger[]
  const told = handles.map(async (trigger) => ({
    trigger,
    ...(await trigger.evaluate((element) => {
      const name = element.getAttribute('aria-label') ?? element.textContent ?? ''
      const words = /^How .* computed/.test(name) ? 'How … is computed' : name.trim().replace(/[\d.,]+/g, '#')
      const label = (element as HTMLInputElement).labels?.[0]?.textContent?.trim().replace(/\d+/g, '#') ?? ''
      return {
        kind: `${element.getAttribute('role') ?? element.tagName.toLowerCase()} “${words || label}”`,
        isShared: !element.closest('main'),
        isReachable: element.checkVisibility() && element.tabIndex >= 0 && element.ariaDisabled !== 'true',
      }
    })),
  }))
  const all = await Promise.all(told)
  const kinds = new Map(all.filter(({ isReachable }) => isReachable).map((one) => [one.kind, one]))
  return [...kinds.values()]
}

async function lookAt(page: Page, trigger: Trigger, about: PopupsOf): Promise<string[]> {
  await open(page, trigger)
  const problems = await violationsIn(page, about)
  const leading = await page.$$eval(LEADING, (items) => items.map((item) => item.textContent!.trim()))
  problems.push(...(await close(page, trigger)))
  for (const words of leading) problems.push(...(await lookThrough(page, trigger, words, about)))
  return problems
}

/** What an entry of the menu leads to; the focus comes back to what opened the menu. */
async function lookThrough(page: Page, trigger: Trigger, words: string, about: PopupsOf): Promise<string[]> {
  await open(page, trigger)
  await page.locator(LEADING, { hasText: words }).first().press('Enter', PATIENCE)
  await page.waitForFunction(() => document.activeElement?.closest('[role$="dialog"]'), undefined, PATIENCE)
  const found = [...(await violationsIn(page, about)), ...(await close(page, trigger))]
  return found.map((problem) => `${problem}, by its entry “${words}”`)
}

async function open(page: Page, trigger: Trigger): Promise<void> {
  await trigger.focus()
  const isBox = await trigger.evaluate((element) => element.role === 'combobox')
  if (isBox) await askFor(page, trigger)
  else await trigger.press('Enter', PATIENCE)
  await page.waitForSelector(POPUPS, PATIENCE)
  await twoFrames(page)
}

/** Some of what is typed has an answer. */
async function askFor(page: Page, box: Trigger): Promise<void> {
  for (const letter of TYPED) {
    await box.fill(letter)
    await twoFrames(page)
    if ((await box.getAttribute('aria-expanded')) === 'true') return
  }
}

async function violationsIn(page: Page, { themes, seen }: PopupsOf): Promise<string[]> {
  const problems = await violations(page, 'all but colours', POPUPS)
  const colours = await colourProblems(page, { themes, seen, within: POPUPS })
  return [...problems, ...colours.map(({ theme, problem }) => `${problem}, ${theme}`)]
}

async function close(page: Page, trigger: Trigger): Promise<string[]> {
  await page.keyboard.press('Escape')
  await page.waitForFunction((popups) => !document.querySelector(popups), POPUPS, PATIENCE)
  await twoFrames(page)
  const focused = await page.evaluate(() => document.activeElement?.outerHTML.slice(0, 120) ?? '')
  const isBack = await trigger.evaluate((element) => element === document.activeElement)
  return isBack ? [] : [`after Escape the focus is not back on it but on ${focused}`]
}
