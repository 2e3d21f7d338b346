import { sizeOf } from '../../graph/graph'
import type { Attempt, PartialEmbedding } from '../method'
import { shortenStart } from '../rework'
import type { EmbeddingTask } from '../task'
import { BipartiteFitter } from './bipartite-fit'
import { bipartition } from './bipartition'
import { CornerFitter } from './corner-fit'
import { crossingsOf } from './crossings'
import { Fitter } from './fitter'
import { fitNetwork } from './transposition-network'

const DEFAULTS = {
  /** Larger problems never fit and would need large tables. */
  mostVariables: 4096,
  /** Interactions beyond which shortening gains next to nothing for the time it takes. */
  mostShortened: 3000,
}

function fitLines(fitter: Fitter): void {
  const { machine, usable, segments } = fitter.task
  const crossings = crossingsOf(machine, usable, segments)
  if (!crossings || crossings.vertical.count === 0 || crossings.horizontal.count === 0) return
  const sides = bipartition(fitter.core)
  if (sides) new BipartiteFitter(fitter, crossings, sides).run()
  new CornerFitter(fitter, crossings).run()
}

/**
 * One try of cutting a published construction to the problem, followed by shortening: on machines of lines those of
 * complete graphs (Choi, Minor-embedding in adiabatic quantum computation II, 2011; Boothby, King & Roy, Fast clique
 * minor generation in Chimera qubit connectivity graphs, 2016) and of complete bipartite graphs, on king's graphs a
 * transposition network. Returns null whether or not anything fits: what nearly does is of no use to anyone.
 */
export function fitTemplate(task: EmbeddingTask, attempt: Attempt): PartialEmbedding | null {
  if (task.problem.order > DEFAULTS.mostVariables) return null
  const fitter = new Fitter(task, attempt)
  if (fitter.core.order === 0) fitter.offer()
  else if (task.family?.kind === 'king') fitNetwork(fitter, task.family)
  else fitLines(fitter)
  if (!fitter.best || sizeOf(task.problem) > DEFAULTS.mostShortened || attempt.watch.shouldStop(0)) return null
  const frozen = new Uint8Array(task.problem.order)
  shortenStart({ ...task, start: { chains: fitter.best, frozen } }, attempt)
  return null
}
