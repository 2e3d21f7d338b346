import type { Locator, Page } from 'playwright-core'

/** More stops than this from one thing to the next is no way to work. */
const MOST_STOPS = 150

interface Stop {
  readonly name: string
  readonly isMarked: boolean
}

/** What has the focus, and whether it, or what it sits in, is drawn so that it can be seen. */
async function stopAt(page: Page): Promise<Stop> {
  return page.evaluate(() => {
    const element = document.activeElement as HTMLElement | null
    if (!element || element === document.body) return { name: 'the page', isMarked: true }
    const isDrawn = (part: Element): boolean => {
      const { outlineStyle, outlineWidth } = getComputedStyle(part)
      return outlineStyle !== 'none' && Number.parseFloat(outlineWidth) >= 2
    }
    const label = element.getAttribute('aria-label') ?? (element as HTMLInputElement).labels?.[0]?.textContent
    const name = (label ?? element.textContent ?? '').replace(/\s+/g, ' ').trim().slice(0, 60)
    const around = [element, element.parentElement, element.parentElement?.parentElement].filter((part) => !!part)
    const beside = element.nextElementSibling ? [element.nextElementSibling] : []
    return { name: `${element.tagName.toLowerCase()} “${name}”`, isMarked: [...around, ...beside].some(isDrawn) }
  })
}

/** Works a page by keys alone. Every stop on the way must show that it has the focus. */
export class Keyboard {
  constructor(private readonly page: Page) {}

  press = (...keys: string[]): Promise<void> =>
    keys.reduce((before, key) => before.then(() => this.page.keyboard.press(key)), Promise.resolve())

  /** Presses Tab until this has the focus. @throws Error naming the stops when it is never reached */
  async to(target: Locator, key: 'Tab' | 'Shift+Tab' = 'Tab'): Promise<void> {
    await this.tab(target, key, () => target.evaluate((element) => element === document.activeElement))
  }

  /** Goes to a link or button and presses it. */
  async use(target: Locator): Promise<void> {
    await this.to(target)
    await this.press('Enter')
  }

  /** Goes to a field and puts this in place of what it holds. */
  async write(target: Locator, text: string): Promise<void> {
    await this.to(target)
    await this.press('ControlOrMeta+a')
    await this.page.keyboard.insertText(text)
  }

  /** Goes to the group that the radio belongs to, which is one stop, then to the radio with the arrows. */
  async choose(radio: Locator): Promise<void> {
    await this.tab(radio, 'Tab', () => radio.evaluate(isFocusedWithGroup))
    for (let step = 0; step < MOST_STOPS; step++) {
      if (await radio.evaluate((element) => element === document.activeElement)) return this.press('Space')
      await this.press('ArrowDown')
    }
    throw new Error(`${radio} is not reached with the arrows`)
  }

  private async tab(target: Locator, key: string, isThere: () => Promise<boolean>): Promise<void> {
    await target.waitFor({ state: 'attached' })
    const passed: string[] = []
    for (let stops = 0; stops < MOST_STOPS; stops++) {
      await this.press(key)
      const { name, isMarked } = await stopAt(this.page)
      if (!isMarked) throw new Error(`${name} has the focus and does not show it`)
      if (await isThere()) return
      passed.push(name)
    }
    throw new Error(`${target} was not reached with ${key}; stops were ${passed.join(', ')}`)
  }
}

/** Runs in the page: whether this radio, or another of its group, has the focus. */
function isFocusedWithGroup(radio: Element): boolean {
  const focused = document.activeElement
  if (radio instanceof HTMLInputElement)
    return focused instanceof HTMLInputElement && focused.type === 'radio' && focused.name === radio.name
  return !!focused && radio.closest('[role=radiogroup]')?.contains(focused) === true
}
