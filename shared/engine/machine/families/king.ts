import { buildPoints, RECTANGLE_SIZES } from './points'
import type { FamilyOf, FamilyRules } from './rules'

/** King's graph: the cells of a board, each joined to its up to eight neighbours. Number y·width + x. */
export const king: FamilyRules<FamilyOf<'king'>> = {
  sizes: RECTANGLE_SIZES,
  name: ({ width, height }) => `king’s graph ${width}×${height}`,
  qubitCount: ({ width, height }) => width * height,
  couplerCount: ({ width, height }) => 4 * width * height - 3 * (width + height) + 2,
  build: ({ width, height }) =>
    buildPoints(width, height, [
      [1, 0],
      [-1, 1],
      [0, 1],
      [1, 1],
    ]),
}
