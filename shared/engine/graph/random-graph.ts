import type { Random } from '../random'
import { graphFromSortedEdges } from './build'
import type { Graph } from './graph'

/**
 * A graph drawn evenly from all those of `order` vertices with round(density · order · (order − 1) / 2) edges (Erdős & Rényi
 * 1959), so that its density is what it is said to be. Pairs are taken one after the other with the chance that is left
 * (selection sampling: Fan, Muller & Rezucha, JASA 57:387, 1962): O(order²).
 * @param density 0 … 1
 * @throws RangeError for a density outside 0 … 1
 */
export function randomGraph(order: number, density: number, random: Pick<Random, 'float'>): Graph {
  if (!(density >= 0 && density <= 1)) throw new RangeError(`a density lies in 0 … 1, not ${density}`)
  let pairs = (order * (order - 1)) / 2
  let wanted = Math.round(density * pairs)
  const ends = new Uint32Array(2 * wanted)
  let length = 0
  for (let a = 0; a < order; a++)
    for (let b = a + 1; b < order; b++) {
      if (random.float() * pairs < wanted) {
        ends[length++] = a
        ends[length++] = b
        wanted--
      }
      pairs--
    }
  return graphFromSortedEdges(order, ends)
}
