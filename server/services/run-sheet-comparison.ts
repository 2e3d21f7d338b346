import type { ComparedSheet, RunSheetComparison } from '../../shared/run-sheet-comparison'
import { comparisonOf } from '../../shared/run-sheet-comparison'
import type { Actor, App } from '../app'
import { programmeShown } from './programming'
import { benchOf, runSheetRow, runSheetView } from './run-sheets'

async function comparedSheet(app: App, actor: Actor, id: string): Promise<ComparedSheet> {
  const view = await runSheetView(app, actor, id)
  const bench = await benchOf(app, actor, await runSheetRow(app, actor, id))
  const { strengths } = programmeShown(bench, view.settings)
  const { offsets } = bench.embedding
  // A single qubit has no coupler that a strength could be programmed on.
  const isChain = (i: number): boolean => offsets[i + 1]! - offsets[i]! > 1
  const chains = bench.labels.flatMap((label, i) => (isChain(i) ? [{ label, strength: strengths[i]! }] : []))
  return { ...view, strengths: chains }
}

/** Two run sheets side by side, each as it stands now. @throws DomainError not found */
export async function compareRunSheets(
  app: App,
  actor: Actor,
  { a, b }: { a: string; b: string },
): Promise<RunSheetComparison> {
  const first = await comparedSheet(app, actor, a)
  return comparisonOf(first, a === b ? first : await comparedSheet(app, actor, b))
}
