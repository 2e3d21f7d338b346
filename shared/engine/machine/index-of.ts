import type { Fabric } from './fabric'

/**
 * A look-up from published qubit number to dense index, −1 for numbers that the fabric does not have.
 * Binary search, since published numbers may leave gaps.
 */
export function indexById({ ids }: Pick<Fabric, 'ids'>): (id: number) => number {
  return (id) => {
    let low = 0
    let high = ids.length
    while (low < high) {
      const middle = (low + high) >> 1
      if (ids[middle]! < id) low = middle + 1
      else high = middle
    }
    return ids[low] === id ? low : -1
  }
}
