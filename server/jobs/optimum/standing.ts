import { groupDigits } from '../../../shared/engine/digits'
import type { Form, Problem } from '../../../shared/engine/problem/problem'
import { quickLowerBound } from '../../../shared/engine/problem/optimum/bounds'
import { annealedOutcome, assembleOptimum } from '../../../shared/engine/problem/optimum/outcome'
import type { OptimumPlan } from '../../../shared/engine/problem/optimum/plan'
import type { ReferenceProgress } from '../../../shared/schemas/reference'
import { signed, signOf } from '../../services/sense'

/** Where the look for an optimum stands: best energy and bound of the whole, from what is known of each component. */
export class Standing {
  private readonly base: number
  private readonly energies: (number | null)[]
  private readonly bounds: number[]
  private solved = 0
  private doing = 'planning'

  constructor(
    private readonly subject: { problem: Problem; form: Form; sense: 'min' | 'max' },
    private readonly plan: OptimumPlan,
    private readonly limitSeconds: number,
  ) {
    // With all components down each adds nothing: what is left is the offset and the isolated variables.
    const nothing = plan.parts.map((part) => annealedOutcome(part, null))
    this.base =
      assembleOptimum(subject.problem, subject.form, plan, nothing).energy -
      nothing.reduce((sum, { energy }) => sum + energy, 0)
    this.energies = plan.parts.map(() => null)
    this.bounds = plan.parts.map(({ qubo }) => quickLowerBound(qubo))
  }

  /** What is done now, as shown. */
  at(doing: string): void {
    this.doing = doing
  }

  /** News of a component; worse news than what is known is dropped. */
  tell(part: number, energy: number | null, bound: number | null): void {
    const known = this.energies[part]!
    if (energy !== null) this.energies[part] = known === null ? energy : Math.min(known, energy)
    if (bound !== null) this.bounds[part] = Math.max(this.bounds[part]!, bound)
  }

  /** A component is over and done with. */
  end(part: number, energy: number, bound: number): void {
    this.energies[part] = energy
    this.bounds[part] = bound
    this.solved++
  }

  /** Seconds of the limit, or components that are done, whichever is further. */
  fraction(seconds: number): number {
    return Math.max(seconds / this.limitSeconds, this.solved / Math.max(1, this.plan.parts.length))
  }

  get message(): string {
    const total = this.plan.parts.length
    return total > 1
      ? `${this.doing}; ${groupDigits(this.solved)} of ${groupDigits(total)} components done`
      : this.doing
  }

  /** In the problem's own sense. */
  get progress(): ReferenceProgress {
    const sign = signOf(this.subject.sense)
    const total = (list: readonly number[]): number =>
      signed(
        sign,
        list.reduce((sum, value) => sum + value, this.base),
      )
    const known = this.energies.filter((energy) => energy !== null)
    return {
      best: known.length === this.energies.length ? total(known) : null,
      bound: total(this.bounds.map((bound, part) => Math.min(bound, this.energies[part] ?? bound))),
      doing: this.doing,
      components: this.plan.parts.length,
      solved: this.solved,
      limitSeconds: this.limitSeconds,
    }
  }
}
