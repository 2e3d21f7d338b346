import { csvCell } from '../../shared/csv'
import { determinedValues, OPEN } from '../../shared/engine/problem/presolve/determined'
import { NONE, RULES } from '../../shared/engine/problem/presolve/record'
import { DomainError } from '../../shared/errors'
import { canPresolve, PRESOLVE_LIMITS, presolvesAtOnce } from '../../shared/presolve-limits'
import type { PresolveState, PresolveSummary, PresolveView, RemovedVariable } from '../../shared/schemas/presolve'
import type { Actor, App } from '../app'
import type { ProblemRow } from '../database/repositories/problems'
import type { PresolvedProblem } from './presolve-runs'
import { finishedPresolve, presolved, runningPresolve } from './presolve-runs'
import { problemRow } from './problems'
import { signed, signOf } from './sense'

/** Variables taken out that one answer names; all are in the file. */
const SHOWN_REMOVED = 2000

/** @throws DomainError for a problem that pre-solve does not take */
export function requirePresolvable(row: ProblemRow): void {
  if (canPresolve(row)) return
  const { variables, interactions } = PRESOLVE_LIMITS
  throw new DomainError(
    'too large',
    'presolve.size',
    `Pre-solve takes up to ${variables} variables and ${interactions} interactions; this problem has ${row.variables} and ${row.interactions}.`,
  )
}

export function summaryOf(row: ProblemRow, { reduction }: PresolvedProblem): PresolveSummary {
  const { problem, steps, lowerBound, rounds, isExact } = reduction
  const counts = new Uint32Array(RULES.length)
  for (const rule of steps.rule) counts[rule]!++
  const inSense = (energy: number): number => signed(signOf(row.sense), energy)
  return {
    before: { variables: row.variables, interactions: row.interactions },
    after: { variables: problem.n, interactions: problem.values.length },
    byRule: RULES.map((rule, k) => ({ rule, count: counts[k]! })).filter(({ count }) => count > 0),
    rounds,
    bound: lowerBound === null ? null : inSense(lowerBound),
    optimum: problem.n === 0 ? inSense(problem.offset) : null,
    isExact,
  }
}

function removedVariables({ reduction, data }: PresolvedProblem, limit: number): RemovedVariable[] {
  const { steps } = reduction
  const values = determinedValues(reduction)
  const down = data.form === 'qubo' ? 0 : -1
  return Array.from({ length: Math.min(limit, steps.variable.length) }, (_, k): RemovedVariable => {
    const partners = [steps.first[k]!, steps.second[k]!].filter((partner) => partner !== NONE)
    const value = values[steps.variable[k]!]!
    return {
      order: k + 1,
      label: data.labels[steps.variable[k]!]!,
      rule: RULES[steps.rule[k]!]!,
      value: value === OPEN ? null : value === 1 ? 1 : down,
      partners: partners.map((partner) => data.labels[partner]!),
      table: Array.from({ length: 2 ** partners.length }, (__, bit) => (((steps.table[k]! >> bit) & 1) === 1 ? 1 : 0)),
      quantities: Array.from(steps.quantities.subarray(3 * k, 3 * k + 3)),
    }
  })
}

function sizesOf(components: Uint32Array): PresolveView['components'] {
  const counts = new Map<number, number>()
  for (const variables of components) counts.set(variables, (counts.get(variables) ?? 0) + 1)
  return [...counts].map(([variables, count]) => ({ variables, count }))
}

/**
 * What pre-solve makes of a problem; nothing is saved.
 * @param signal that who asked is gone
 */
export async function presolveView(
  app: App,
  actor: Actor,
  id: string,
  version?: number,
  signal?: AbortSignal,
): Promise<PresolveView> {
  const row = await problemRow(app, actor, id, version)
  requirePresolvable(row)
  const result = await presolved(app, row, signal)
  const { form, sense, number, name } = row
  return {
    ...summaryOf(row, result),
    problem: { id, number, name, version: row.version, form, sense },
    removed: removedVariables(result, SHOWN_REMOVED),
    removedCount: result.reduction.steps.variable.length,
    components: sizesOf(result.reduction.components),
    isStopped: result.reduction.isStopped,
    seconds: result.seconds,
    version: app.version,
  }
}

/** The headline of a pre-solve: of small problems at once, of others when one was run a while ago. */
export async function presolveState(app: App, actor: Actor, id: string, version?: number): Promise<PresolveState> {
  const row = await problemRow(app, actor, id, version)
  if (!canPresolve(row)) return { state: 'too large' }
  const progress = runningPresolve(row)
  if (progress) return { state: 'running', ...progress }
  const result = presolvesAtOnce(row) ? await presolved(app, row) : finishedPresolve(row)
  return result ? { state: 'done', summary: summaryOf(row, result) } : { state: 'not run' }
}

/** All variables taken out, one a line, in the order in which they were; the quantities are explained in the docs. */
export async function presolveFile(
  app: App,
  actor: Actor,
  id: string,
  version?: number,
  signal?: AbortSignal,
): Promise<{ fileName: string; bytes: Uint8Array }> {
  const row = await problemRow(app, actor, id, version)
  requirePresolvable(row)
  const removed = removedVariables(await presolved(app, row, signal), Infinity)
  const head = 'order,variable,rule,value,partner_1,partner_2,values_by_partners,quantity_1,quantity_2,quantity_3'
  const lines = removed.map(({ order, label, rule, value, partners, table, quantities }) =>
    [
      order,
      csvCell(label),
      rule,
      value ?? '',
      csvCell(partners[0] ?? ''),
      csvCell(partners[1] ?? ''),
      table.join(' '),
      ...quantities,
    ].join(','),
  )
  return { fileName: `P-${row.number}-presolve.csv`, bytes: Buffer.from([head, ...lines, ''].join('\n')) }
}
