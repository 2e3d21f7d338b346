import { groupDigits } from '../../../shared/engine/digits'
import type { AnnealedBest } from '../../../shared/engine/problem/optimum/anneal-restarts'
import { mergeAnnealed } from '../../../shared/engine/problem/optimum/anneal-restarts'
import { enumerationTolerance, mergeSlices, sliceCount } from '../../../shared/engine/problem/optimum/enumerate-slice'
import type { SliceOutcome } from '../../../shared/engine/problem/optimum/enumerate-slice'
import type { PartOutcome } from '../../../shared/engine/problem/optimum/outcome'
import {
  annealedOutcome,
  eliminatedOutcome,
  enumeratedOutcome,
  programmeOutcome,
  sufficientGap,
} from '../../../shared/engine/problem/optimum/outcome'
import type { OptimumPart, OptimumPlan } from '../../../shared/engine/problem/optimum/plan'
import type { Compute } from '../../workers/compute'
import type { Deadline } from '../../workers/deadline'
import { newSearchClock, secondsOn } from '../../workers/search-clock'
import { shareArrays } from '../../workers/shared-arrays'
import { spread } from './spread'
import type { Standing } from './standing'

/** Cuts of the restarts: enough to share the load and to show progress. Cutting changes nothing in the outcome. */
const RESTARTS_A_TASK = 4

/** An outcome with what it took. */
export interface SolvedPart extends PartOutcome {
  readonly seconds: number
}

interface SolvingInput {
  readonly plan: OptimumPlan
  readonly seed: number
  readonly limitSeconds: number
  readonly standing: Standing
  readonly signal: AbortSignal
  /** Called whenever the standing has changed. */
  readonly tell: (seconds: number) => void
}

/**
 * Solves the components of a plan on the worker threads: the quick ones all together, the others one after the other,
 * easiest first, each with an equal share of the time that is left. Only the time limit and a cancellation can make the
 * outcome differ from one run to the next; both keep the best so far.
 */
export async function solveParts(compute: Compute, input: SolvingInput): Promise<SolvedPart[]> {
  return new Solving(compute, input).run()
}

class Solving {
  private readonly clock = newSearchClock()
  private readonly parts: readonly OptimumPart[]

  constructor(
    private readonly compute: Compute,
    private readonly input: SolvingInput,
  ) {
    this.parts = shareArrays(input.plan.parts)
  }

  async run(): Promise<SolvedPart[]> {
    const quick = this.parts.filter(({ anneal }) => anneal === null).length
    const solved = await this.solveQuick(this.parts.slice(0, quick))
    for (let index = quick; index < this.parts.length; index++) {
      const begun = secondsOn(this.clock)
      const left = Math.max(0, this.input.limitSeconds - begun)
      const deadline = { clock: this.clock, seconds: begun + left / (this.parts.length - index) }
      const outcome = await this.solve(index, deadline)
      this.input.standing.end(index, outcome.energy, outcome.bound)
      solved.push({ ...outcome, seconds: secondsOn(this.clock) - begun })
    }
    return solved
  }

  private tell(doing?: string): void {
    if (doing) this.input.standing.at(doing)
    this.input.tell(secondsOn(this.clock))
  }

  private async solveQuick(parts: readonly OptimumPart[]): Promise<SolvedPart[]> {
    if (parts.length === 0) return []
    const { compute, clock } = this
    const { seed, limitSeconds, standing } = this.input
    this.tell(`${groupDigits(parts.length)} small ${parts.length === 1 ? 'component' : 'components'}`)
    const size = Math.ceil(parts.length / compute.threads)
    const chunks = Array.from({ length: Math.ceil(parts.length / size) }, (_, c) =>
      parts.slice(c * size, (c + 1) * size),
    )
    const deadline = { clock, seconds: limitSeconds }
    // They are run even when the job is cancelled before: each then ends at once with some state.
    const outcomes = await Promise.all(
      chunks.map((chunk) =>
        compute.run('solveQuickParts', { parts: chunk, seed, deadline }, { signal: this.input.signal }),
      ),
    )
    const all = outcomes.flat()
    all.forEach(({ energy, bound }, index) => standing.end(index, energy, bound))
    this.tell()
    const seconds = secondsOn(clock) / parts.length
    return all.map((outcome) => ({ ...outcome, seconds }))
  }

  private async solve(index: number, deadline: Deadline): Promise<PartOutcome> {
    const part = this.parts[index]!
    const size = `${groupDigits(part.qubo.n)} variables`
    this.tell(`annealing ${size}`)
    const annealed = await this.anneal(index, deadline)
    if (part.method === 'annealing') return annealedOutcome(part, annealed)
    if (part.method === 'enumeration') {
      this.tell(`visiting all states of ${size}`)
      return enumeratedOutcome(part, await this.enumerate(part, deadline), annealed)
    }
    if (part.method === 'tree decomposition') {
      this.tell(`dynamic programming over ${size}, width ${part.elimination!.width}`)
      const eliminated = await this.compute.run(
        'eliminatePart',
        { qubo: part.qubo, plan: part.elimination!, deadline },
        { signal: this.input.signal, unbegun: null, onProgress: () => this.tell() },
      )
      return eliminatedOutcome(part, eliminated, annealed)
    }
    this.tell(`integer programme of ${size}`)
    return this.solveProgramme(index, annealed, deadline)
  }

  private async anneal(index: number, deadline: Deadline): Promise<AnnealedBest | null> {
    const { qubo, anneal } = this.parts[index]!
    const { restarts, sweeps } = anneal!
    const { seed, signal, standing } = this.input
    const sets = await spread(Math.ceil(restarts / RESTARTS_A_TASK), this.compute.threads, (k) => {
      const first = k * RESTARTS_A_TASK
      const options = { first, restarts: Math.min(RESTARTS_A_TASK, restarts - first), sweeps, seed }
      return this.compute.run(
        'annealPart',
        { qubo, options, deadline },
        {
          signal,
          unbegun: null,
          onProgress: ({ energy }) => {
            standing.tell(index, energy, null)
            this.tell()
          },
        },
      )
    })
    const done = sets.filter((set) => set !== null)
    if (done.length === 0) return null
    const best = mergeAnnealed(done)
    standing.tell(index, best.energy, null)
    return best
  }

  private async enumerate({ qubo }: OptimumPart, deadline: Deadline): Promise<SliceOutcome> {
    const count = sliceCount(qubo.n)
    const slices = await spread(count, this.compute.threads, (slice) =>
      this.compute.run(
        'enumeratePart',
        { qubo, slice, deadline },
        { signal: this.input.signal, unbegun: null, onProgress: () => this.tell() },
      ),
    )
    const visited = slices.filter((slice) => slice !== null)
    const merged = mergeSlices(visited, enumerationTolerance(qubo))
    return { ...merged, complete: merged.complete && visited.length === count }
  }

  private async solveProgramme(index: number, annealed: AnnealedBest | null, deadline: Deadline): Promise<PartOutcome> {
    const part = this.parts[index]!
    const { standing, seed, signal } = this.input
    const start = annealed?.state ?? new Uint8Array(part.qubo.n)
    const programme = await this.compute.run(
      'solveProgramme',
      { qubo: part.qubo, start, gap: sufficientGap(part), seed, deadline },
      {
        signal,
        unbegun: null,
        onProgress: ({ energy, bound }) => {
          standing.tell(index, energy, bound)
          this.tell()
        },
      },
    )
    return programmeOutcome(part, programme ?? { state: null, bound: -Infinity }, annealed)
  }
}
