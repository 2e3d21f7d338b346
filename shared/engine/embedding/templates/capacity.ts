import { graphFromSortedEdges } from '../../graph/build'
import type { Graph } from '../../graph/graph'
import { createRandom } from '../../random'
import type { Embedding } from '../embedding'
import type { Attempt } from '../method'
import { qualityOf } from '../objective'
import { Watch } from '../progress'
import type { EmbeddingTask } from '../task'
import { CornerFitter } from './corner-fit'
import { crossingsOf } from './crossings'
import { Fitter } from './fitter'
import { fitNetwork } from './transposition-network'

/** A machine by itself, without a problem. */
export type MachineInput = Pick<EmbeddingTask, 'machine' | 'usable' | 'segments' | 'family'>

/** The largest complete graph that was placed, and how. */
export interface CompleteCapacity {
  readonly order: number
  /** Qubits of the longest chain. */
  readonly chainLength: number
  readonly chains: Embedding
}

/** How long to look. */
export interface CapacityBudget {
  /** Orders tried at most; each costs about as much as one try of the method. */
  readonly tries: number
  /** Asked every few milliseconds; what has been found by then is returned. */
  readonly cancelled?: () => boolean
}

/** Complete graph K_n. */
function completeGraph(n: number): Graph {
  const ends = new Uint32Array(n * (n - 1))
  let length = 0
  for (let i = 0; i < n; i++)
    for (let j = i + 1; j < n; j++) {
      ends[length++] = i
      ends[length++] = j
    }
  return graphFromSortedEdges(n, ends)
}

/** Fits complete graphs of one order after the other into one machine. */
class CapacitySearch {
  best: CompleteCapacity | null = null
  private readonly watch: Watch

  constructor(
    private readonly input: MachineInput,
    private readonly seed: number,
    cancelled: () => boolean,
  ) {
    this.watch = new Watch({ now: () => 0, cancelled, report: () => {} }, 'template', 1, Infinity)
  }

  get cancelled(): boolean {
    return this.watch.shouldStop(0)
  }

  private fitter(order: number): Fitter {
    const attempt: Attempt = {
      random: createRandom(this.seed, order),
      seconds: 0,
      watch: this.watch,
      objective: 'longest chain',
      kernel: 'plain',
      offer: () => {},
    }
    return new Fitter({ ...this.input, problem: completeGraph(order), start: null }, attempt)
  }

  /** Chains that fit without any search: the least that is to be had, and worth doubting nothing. */
  heldOutright(): number {
    const { machine, usable, segments } = this.input
    const crossings = crossingsOf(machine, usable, segments)
    if (!crossings || crossings.vertical.count === 0 || crossings.horizontal.count === 0) return 0
    return new CornerFitter(this.fitter(2), crossings).heldByAll()
  }

  private keep({ best }: Fitter, order: number): boolean {
    if (!best) return false
    if (!this.best || order > this.best.order) this.best = { order, chainLength: qualityOf(best).longest, chains: best }
    return true
  }

  fits(order: number): boolean {
    const { machine, usable, segments, family } = this.input
    const fitter = this.fitter(order)
    if (family?.kind === 'king') fitNetwork(fitter, family)
    else new CornerFitter(fitter, crossingsOf(machine, usable, segments)!).run(true)
    return this.keep(fitter, order)
  }
}

/**
 * The largest complete graph that the templates place on a machine: a lower bound of what is possible. The same seed and
 * number of tries give the same.
 * @returns null where there is no template: on machines without lines that are no king's graphs
 * @throws RangeError for fewer than one try
 */
export function largestCompleteGraph(
  input: MachineInput,
  seed: number,
  { tries, cancelled = () => false }: CapacityBudget,
): CompleteCapacity | null {
  if (!(tries >= 1)) throw new RangeError(`tries must be at least 1, not ${tries}`)
  const search = new CapacitySearch(input, seed, cancelled)
  const { family } = input
  const king = family?.kind === 'king'
  const outright = king ? 0 : search.heldOutright()
  if (outright === 0 && !king) return null
  let low = Math.max(1, outright)
  let high = king ? Math.max(family.width, family.height) : Math.floor(1.4 * outright) + 1
  search.fits(low)
  for (let k = 1; k < tries && low < high && !search.cancelled; k++) {
    const middle = (low + high + 1) >> 1
    if (search.fits(middle)) low = middle
    else high = middle - 1
  }
  return search.best
}
