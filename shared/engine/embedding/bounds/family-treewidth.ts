import type { PublishedFamily } from '../../machine/fabric'

/**
 * The treewidth of a family graph without defects is at most this, in closed form: the width that `sweepOrder` reaches
 * along the longer side. Chimera: t·min(m, n), whose front holds one qubit of every line (Klymko, Sullivan & Humble
 * 2014; Boothby, King & Roy 2016). Square grid: the shorter side; king's graph: one more. Pegasus 12m − 4 and Zephyr
 * 2t(2m + 1) are ours, from the front of such a sweep; the tests compare them with the sweep, size by size. Cubic grid:
 * the product of the two shorter sides, the bandwidth when points are numbered with the longest side outermost. Heavy
 * hexagons: one more than the shorter of rows and columns, argued in docs/formulas.md; sweeps reach one more than that.
 */
export function familyTreewidth(family: PublishedFamily): number {
  switch (family.kind) {
    case 'chimera':
      return family.t * Math.min(family.m, family.n)
    case 'pegasus':
      return 12 * family.m - 4
    case 'zephyr':
      return 2 * family.t * (2 * family.m + 1)
    case 'king':
      return Math.min(family.width, family.height) + 1
    case 'square':
      return Math.min(family.width, family.height)
    case 'cubic': {
      const { width, height, depth } = family
      return (width * height * depth) / Math.max(width, height, depth)
    }
    case 'heavy-hex':
      return Math.min(family.rows, family.columns) + 1
  }
}
