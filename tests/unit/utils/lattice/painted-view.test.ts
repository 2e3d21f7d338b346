import { describe, expect, it } from 'vitest'
import { boxNow, covers, isSameView, isUsedUp, marginOf } from '../../../../utils/lattice/painted-view'

const [width, height] = [600, 400]
const painted = {
  view: { scale: 10, x: 30, y: 40 },
  width: 800,
  height: 600,
  marginX: 100,
  marginY: 100,
  ratio: 1,
}

describe('a painted picture under a moving camera', () => {
  it('puts every point of the lattice where the camera has it', () => {
    const now = { scale: 15, x: -80, y: 7 }
    const box = boxNow(painted, now)
    // Lattice point (12, −3): its pixel in the picture, shifted and stretched, against its pixel in the viewport.
    const inPicture = [painted.view.x + painted.marginX + 120, painted.view.y + painted.marginY - 30]
    expect(box.x1 + box.stretch * inPicture[0]!).toBeCloseTo(now.x + 15 * 12, 9)
    expect(box.y1 + box.stretch * inPicture[1]!).toBeCloseTo(now.y - 15 * 3, 9)
  })

  it('covers the viewport until its margin is left behind', () => {
    const at = (x: number) => covers(boxNow(painted, { ...painted.view, x }), width, height)
    expect(at(30)).toBe(true)
    expect(at(130)).toBe(true)
    expect(at(131)).toBe(false)
    expect(at(-71)).toBe(false)
  })

  it('is used up before it stops covering, and when it is stretched or shrunk too far', () => {
    const isUsed = (scale: number, x: number) =>
      isUsedUp(painted, { scale, x: x + (painted.view.x * scale) / 10, y: (40 * scale) / 10 }, width, height)
    expect(isUsed(10, 0)).toBe(false)
    expect(isUsed(10, 50)).toBe(false)
    expect(isUsed(10, 60)).toBe(true)
    expect(isUsed(10, -60)).toBe(true)
    expect(isUsed(20, -300)).toBe(true)
    expect(isUsed(6, 100)).toBe(true)
  })

  it('takes views for the same that differ by rounding only', () => {
    expect(isSameView(painted.view, { scale: 10.000001, x: 30.001, y: 40 })).toBe(true)
    expect(isSameView(painted.view, { scale: 10, x: 30.1, y: 40 })).toBe(false)
  })

  it('has a margin that grows with the viewport up to a limit', () => {
    expect(marginOf(600)).toBe(210)
    expect(marginOf(3840)).toBe(280)
  })
})
