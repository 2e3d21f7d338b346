/**
 * Which way to the optimum suits each component of a problem: an exact one wherever time and memory allow it, chosen by
 * counted effort, never by the clock, so the same problem is always treated the same way.
 */
import { convertForm } from '../convert'
import { interactionGraph } from '../interaction-graph'
import type { Form, Problem } from '../problem'
import type { EliminationPlan } from './elimination-plan'
import { planElimination } from './elimination-plan'
import { MOST_ENUMERATED } from './enumerate-slice'
import { energyGrid } from './grid'
import { splitComponents } from './parts'

/** Ways to an optimum; all but the last prove it when they come to their end. */
export type OptimumMethod = 'enumeration' | 'tree decomposition' | 'integer programme' | 'annealing'

const DEFAULTS = {
  /** States, or table entries, that may be gone through: a minute or two of one thread. */
  mostEnumeration: 2 ** 32,
  mostElimination: 2 ** 33,
  /** The widest decomposition, and what its tables may take. */
  mostWidth: 24,
  mostBytes: 768 * 2 ** 20,
  /** Beyond these the integer programme would take gigabytes, or end without a useful bound. */
  mostInteger: { variables: 2000, interactions: 20_000 },
  /** Table entries are read and written where states are only added up. */
  entryPerState: 3,
  /** Effort, in states, up to which a component needs no first guess by annealing. */
  quick: 2 ** 24,
  restarts: { first: 32, alone: 256 },
  sweeps: 1000,
  leastSweeps: 50,
  /** Flips that annealing may offer, interactions counted too. */
  mostOffers: 2e10,
}

interface AnnealPlan {
  readonly restarts: number
  readonly sweeps: number
}

/** A component of two or more variables and how it is solved. */
export interface OptimumPart {
  /** Its variables in the whole problem, ascending. */
  readonly variables: Uint32Array
  /** Over x ∈ {0, 1}, without offset. */
  readonly qubo: Problem
  /** Step that all its energies are multiples of, where sums keep it; null where they are rounded. */
  readonly grid: number | null
  readonly method: OptimumMethod
  readonly elimination: EliminationPlan | null
  /** The search for a first state, and all there is for a component too large to be proved; null where it is not needed. */
  readonly anneal: AnnealPlan | null
  /** Estimated effort of the method, in states visited. */
  readonly effort: number
}

export interface OptimumPlan {
  /** Easiest first. */
  readonly parts: readonly OptimumPart[]
  /** Variables without interactions: settled by the sign of their coefficient. */
  readonly isolated: Uint32Array
  readonly isolatedState: Uint8Array
}

/** Asked-for method that a component is too large for. */
export class UnsuitableMethod extends RangeError {}

interface Option {
  readonly method: OptimumMethod
  readonly effort: number
}

function optionsFor(qubo: Problem, elimination: EliminationPlan | null): Option[] {
  const { n } = qubo
  const options: Option[] = []
  if (n <= MOST_ENUMERATED && 2 ** n <= DEFAULTS.mostEnumeration)
    options.push({ method: 'enumeration', effort: 2 ** n })
  if (elimination && elimination.work <= DEFAULTS.mostElimination && elimination.bytes <= DEFAULTS.mostBytes)
    options.push({ method: 'tree decomposition', effort: DEFAULTS.entryPerState * elimination.work })
  options.sort((a, b) => a.effort - b.effort)
  const { variables, interactions } = DEFAULTS.mostInteger
  if (n <= variables && qubo.values.length <= interactions)
    options.push({ method: 'integer programme', effort: Infinity })
  options.push({ method: 'annealing', effort: Infinity })
  return options
}

function annealPlan(qubo: Problem, { method, effort }: Option): AnnealPlan | null {
  if (effort <= DEFAULTS.quick) return null
  const { first, alone } = DEFAULTS.restarts
  const most = DEFAULTS.mostOffers / (qubo.n + qubo.values.length)
  const restarts = method === 'annealing' ? alone : first
  const sweeps = Math.max(DEFAULTS.leastSweeps, Math.min(DEFAULTS.sweeps, Math.floor(most / restarts)))
  return { restarts: Math.max(1, Math.min(restarts, Math.floor(most / sweeps))), sweeps }
}

const unsuitable = (method: OptimumMethod, n: number, interactions: number): string => {
  const reasons: Record<OptimumMethod, string> = {
    enumeration: `enumeration is for at most ${Math.log2(DEFAULTS.mostEnumeration)}`,
    'tree decomposition': `no tree decomposition narrow enough was found: width ${DEFAULTS.mostWidth} at most`,
    'integer programme': `the integer programme is for at most ${DEFAULTS.mostInteger.variables}, and ${DEFAULTS.mostInteger.interactions} interactions`,
    annealing: '',
  }
  return `one component has ${n} variables and ${interactions} interactions; ${reasons[method]}`
}

/** @throws UnsuitableMethod */
function planPart(variables: Uint32Array, own: Problem, form: Form, asked: OptimumMethod | null): OptimumPart {
  const qubo = convertForm(own, form, 'qubo')
  const mayEliminate = asked === null || asked === 'tree decomposition'
  const elimination = mayEliminate ? planElimination(interactionGraph(qubo), DEFAULTS.mostWidth) : null
  const options = optionsFor(qubo, elimination)
  const option = asked ? options.find(({ method }) => method === asked) : options[0]
  if (!option) throw new UnsuitableMethod(unsuitable(asked!, qubo.n, qubo.values.length))
  const { method, effort } = option
  return {
    variables,
    qubo,
    grid: energyGrid(own) === null ? null : energyGrid(qubo),
    method,
    elimination: method === 'tree decomposition' ? elimination : null,
    anneal: annealPlan(qubo, option),
    effort,
  }
}

/**
 * The components of a problem, each with the exact method that takes the least effort, else the integer programme, else
 * annealing.
 * @param asked the same method for all components instead
 * @throws UnsuitableMethod where a component is too large for the method asked for; RangeError where the QUBO form of
 *   the problem is beyond the range of doubles
 */
export function planOptimum(problem: Problem, form: Form, asked: OptimumMethod | null = null): OptimumPlan {
  const components = splitComponents(problem)
  const isolated = components.filter(({ problem: { n } }) => n === 1)
  const parts = components
    .filter(({ problem: { n } }) => n > 1)
    .map(({ variables, problem: own }) => planPart(variables, own, form, asked))
    .sort((a, b) => a.effort - b.effort || a.qubo.n - b.qubo.n || a.variables[0]! - b.variables[0]!)
  return {
    parts,
    isolated: Uint32Array.from(isolated, ({ variables }) => variables[0]!),
    isolatedState: Uint8Array.from(isolated, ({ problem: { linear } }) => (linear[0]! < 0 ? 1 : 0)),
  }
}
