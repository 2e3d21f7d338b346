import type { Page } from 'playwright-core'
import type { ViewCase } from './cases'
import type { Bench } from './page/main'
import type { Recording } from './page/recorder'

declare const bench: Bench

export interface Gesture {
  readonly name: string
  readonly recording: Recording
}

export interface Measured {
  readonly name: string
  readonly size: { readonly qubits: number; readonly couplers: number; readonly chains: number }
  readonly firstPaint: number
  /** Milliseconds from the data's arrival until the pointer can move the picture. */
  readonly ready: number
  readonly gestures: readonly Gesture[]
}

interface Frame {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

/** Pace of the pointer: about one event a frame. */
const PACE = 16

/** Pause after the start and after a change, so that each gesture is measured by itself. */
const SETTLING = 1000

const middleOf = ({ x, y, width, height }: Frame) => ({ x: x + width / 2, y: y + height / 2 })

/** Drags round in a loop so that the picture leaves its place by most of the frame and comes back. */
async function drag(page: Page, frame: Frame, turns: number): Promise<void> {
  const { x, y } = middleOf(frame)
  await page.mouse.move(x, y)
  await page.mouse.down()
  const steps = 90 * turns
  for (let i = 1; i <= steps; i++) {
    const angle = (2 * Math.PI * i) / 90
    await page.mouse.move(x + 0.4 * frame.width * Math.sin(angle), y + 0.4 * frame.height * (1 - Math.cos(angle)) * 0.5)
    await page.waitForTimeout(PACE)
  }
  await page.mouse.up()
  await page.waitForTimeout(400)
}

/** Notches of the wheel about a point off the middle, in and out again. */
async function wheel(page: Page, frame: Frame, notches: number): Promise<void> {
  const { x, y } = middleOf(frame)
  await page.mouse.move(x + 0.15 * frame.width, y - 0.1 * frame.height)
  for (const direction of [-1, 1])
    for (let i = 0; i < notches; i++) {
      await page.mouse.wheel(0, direction * 100)
      await page.waitForTimeout(90)
    }
  await page.waitForTimeout(400)
}

/** Far pans while zoomed in, each in another direction: more than is kept painted around the frame. */
async function throwAbout(page: Page, frame: Frame): Promise<void> {
  for (let i = 0; i < 5; i++) {
    await page.mouse.wheel(0, -100)
    await page.waitForTimeout(120)
  }
  const { x, y } = middleOf(frame)
  for (const [dx, dy] of [
    [1, 0],
    [-1, 0],
    [0, 1],
    [0, -1],
  ] as const) {
    await page.mouse.move(x - 0.45 * dx * frame.width, y - 0.45 * dy * frame.height)
    await page.mouse.down()
    for (let i = 1; i <= 24; i++) {
      const t = -0.45 + (0.9 * i) / 24
      await page.mouse.move(x + t * dx * frame.width, y + t * dy * frame.height)
      await page.waitForTimeout(PACE)
    }
    await page.mouse.up()
  }
  await page.waitForTimeout(400)
}

export async function measureCase(page: Page, { name }: ViewCase): Promise<Measured> {
  const size = await page.evaluate((wanted) => bench.prepare(wanted), name)
  const firstPaint = await page.evaluate(() => bench.firstPaint())
  const ready = await page.evaluate(() => bench.ready())
  await page.waitForTimeout(SETTLING)
  const frame = (await page.locator('[data-lattice-frame]').boundingBox())!
  const gestures: Gesture[] = []
  const record = async (gesture: string, act: () => Promise<void>) => {
    const recorder = await page.evaluateHandle(() => bench.record())
    await act()
    gestures.push({ name: gesture, recording: await recorder.evaluate((running) => running.stop()) })
  }
  await record('pan', () => drag(page, frame, 2))
  await record('zoom', () => wheel(page, frame, 8))
  await record('far pan, close', () => throwAbout(page, frame))
  await page.evaluate(() => bench.selection.focus(3))
  await page.waitForTimeout(SETTLING)
  await record('pan, chain in focus', () => drag(page, frame, 2))
  return { name, size, firstPaint, ready, gestures }
}
