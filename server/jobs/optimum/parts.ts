import type { OptimumMethod, OptimumPart, OptimumPlan } from '../../../shared/engine/problem/optimum/plan'
import type { ReferencePart } from '../../../shared/schemas/reference'
import type { SolvedPart } from './solve-parts'

/** Components listed one by one, the largest; the others are put together by what was done with them. */
const LISTED = 12

const viewOf = (part: OptimumPart, outcome: SolvedPart): ReferencePart => ({
  components: 1,
  variables: part.qubo.n,
  interactions: part.qubo.values.length,
  method: part.method,
  by: outcome.by,
  width: part.elimination?.width ?? null,
  proved: outcome.proved,
  gap: outcome.energy - outcome.bound,
  seconds: outcome.seconds,
})

/** The components as shown, largest first. */
export function partsOf(plan: OptimumPlan, solved: readonly SolvedPart[]): ReferencePart[] {
  const views = plan.parts
    .map((part, p) => viewOf(part, solved[p]!))
    .sort((a, b) => b.variables - a.variables || b.interactions - a.interactions)
  const groups = new Map<string, ReferencePart>()
  for (const view of views.slice(LISTED)) {
    const key = `${view.method} ${view.by} ${view.proved}`
    const group = groups.get(key)
    if (!group) {
      groups.set(key, { ...view })
      continue
    }
    group.components++
    group.width = group.width === null ? view.width : Math.max(group.width, view.width ?? 0)
    group.gap += view.gap
    group.seconds += view.seconds
  }
  return [...views.slice(0, LISTED), ...groups.values()]
}

const ORDER: readonly OptimumMethod[] = ['tree decomposition', 'enumeration', 'integer programme', 'annealing']

/** The methods that the value rests on: those of proved components, and for others what gave their state. */
export function methodWords(plan: OptimumPlan, solved: readonly SolvedPart[]): string {
  const used = new Set(solved.map((outcome, p) => (outcome.proved ? plan.parts[p]!.method : outcome.by)))
  if (used.size === 0) return 'the signs of the coefficients'
  return ORDER.filter((method) => used.has(method)).join(' and ')
}
