import { buildPoints, RECTANGLE_SIZES } from './points'
import type { FamilyOf, FamilyRules } from './rules'

/** Square grid: points joined to their neighbours in the row and in the column. Number y·width + x. */
export const square: FamilyRules<FamilyOf<'square'>> = {
  sizes: RECTANGLE_SIZES,
  name: ({ width, height }) => `square grid ${width}×${height}`,
  qubitCount: ({ width, height }) => width * height,
  couplerCount: ({ width, height }) => 2 * width * height - width - height,
  build: ({ width, height }) =>
    buildPoints(width, height, [
      [1, 0],
      [0, 1],
    ]),
}
