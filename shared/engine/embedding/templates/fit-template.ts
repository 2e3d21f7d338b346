import type { Runner } from '../method'
import { CornerFitter } from './corner-fit'
import { crossingsOf } from './crossings'
import { Fitter } from './fitter'

/**
 * One try of cutting a complete-graph construction to the problem (Choi, Minor-embedding in adiabatic quantum computation
 * II, 2011; Boothby, King & Roy, Fast clique minor generation in Chimera qubit connectivity graphs, 2016).
 */
export const fitTemplate: Runner = (task, attempt) => {
  const crossings = crossingsOf(task.machine, task.usable, task.segments)
  if (!crossings || crossings.vertical.count === 0 || crossings.horizontal.count === 0) return null
  const fitter = new Fitter(task, attempt)
  new CornerFitter(fitter, crossings).run()
  return null
}
