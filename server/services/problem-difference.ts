import type { DifferenceView, VersionChange, VersionStanding } from '../../shared/schemas/problem-versions'
import type { App } from '../app'
import type { ProblemRow } from '../database/repositories/problems'
import { findReferredProblem } from '../database/repositories/problems'
import type { ProblemData } from './problem-data'
import { problemData } from './problems'
import { Recent } from './recent'

/** Labels and coefficients of each kind in one answer. */
const SHOWN = 50

/** One side of a comparison. */
export interface Compared extends ProblemData {
  sense: 'min' | 'max'
}

/** What changed from one problem to another, worked out by a thread. */
export async function differenceBetween(app: App, before: Compared, after: Compared): Promise<DifferenceView> {
  const { counts, difference } = await app.compute.run('compareProblems', { before, after, shown: SHOWN })
  const { linearChanged, interactionsAdded, interactionsRemoved, interactionsChanged, graph } = difference
  const { added, removed, renamed, changes, offset } = difference
  return {
    variablesAdded: counts.added,
    variablesRemoved: counts.removed,
    variablesRenamed: counts.renamed,
    linearChanged,
    interactionsAdded,
    interactionsRemoved,
    interactionsChanged,
    offsetChanged: offset.before !== offset.after,
    formChanged: before.form !== after.form,
    senseChanged: before.sense !== after.sense,
    graph,
    form: after.form,
    added,
    removed,
    renamed,
    changes: [...changes],
    offset,
  }
}

/** The figures alone, as they are kept with a version. */
export function changeOf(difference: DifferenceView): VersionChange {
  const { form: _form, added: _added, removed: _removed, renamed: _renamed, ...rest } = difference
  const { changes: _changes, offset: _offset, ...change } = rest
  return change
}

/** Versions never change, so what was worked out from two can be kept. */
const differences = new Recent<Promise<DifferenceView>>(64)

/** What changed between two versions of one problem. */
export function versionDifference(app: App, from: ProblemRow, to: ProblemRow): Promise<DifferenceView> {
  const key = `${from.fingerprint} ${from.sense} ${to.fingerprint} ${to.sense}`
  const found = differences.get(key, async () =>
    differenceBetween(
      app,
      { ...(await problemData(app, from)), sense: from.sense },
      { ...(await problemData(app, to)), sense: to.sense },
    ),
  )
  found.catch(() => differences.drop(key, found))
  return found
}

/** How the version that something was made for stands to the current one. */
export async function standingOf(app: App, row: ProblemRow): Promise<VersionStanding> {
  const { version, currentVersion: current } = row
  if (version === current) return { version, current, graph: null }
  const now = await findReferredProblem(app.db, row.id, current)
  return { version, current, graph: now ? (await versionDifference(app, row, now)).graph : null }
}
