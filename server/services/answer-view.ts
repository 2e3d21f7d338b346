import { holds } from '../../shared/engine/problem/groups/group'
import type { AnswerAssignment, AnswerView, GroupCheck } from '../../shared/schemas/answers'
import type { Decoding, LiftedTo, SolutionRow } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import { workspaceName } from '../database/repositories/answer-sheets'
import { findReferredProblem, personOf } from '../database/repositories/problems'
import { liftedSolutions } from './lifted-solutions'
import { loadReturn, readyRow } from './loaded-return'
import { problemData } from './problems'
import type { Bench } from './programming'
import { proportion } from './proportion'
import { weighted } from './return-energies'
import { referenceOfSamples } from './return-reference'
import { inOriginal, listedSolutions, solutionViews } from './return-solutions'
import { decodedBy } from './return-summary'
import { aboutReturn } from './return-view'
import { runSheetRow } from './run-sheets'
import { readsIn } from './samples-data'

/** The confirmed groups of the problem that assignments are of, and its labels. None where that was deleted. */
async function groupsOf(app: App, { problem, labels }: Bench, liftedTo: LiftedTo | null) {
  if (!liftedTo) return { labels, groups: problem.groups ?? [] }
  const original = await findReferredProblem(app.db, liftedTo.id, liftedTo.version)
  if (!original) return { labels: [], groups: [] }
  return { labels: (await problemData(app, original)).labels, groups: original.groups ?? [] }
}

/** Each group, looked up in the assignments themselves. */
const groupChecks = (
  { labels, groups }: Awaited<ReturnType<typeof groupsOf>>,
  rows: readonly SolutionRow[],
): GroupCheck[] =>
  groups.map((group) => {
    const atOne = rows.map(({ assignment }) => group.members.filter((i) => assignment[labels[i]!] === 1).length)
    const { name, kind, k, members } = group
    return { name, kind, k, members: members.length, atOne, kept: atOne.map((count) => holds(group, count)) }
  })

/** The best assignments of a return with what is known of them, for the person who asked. */
export async function answerView(
  app: App,
  actor: Actor,
  id: string,
  { decode, assignments }: { decode: Decoding; assignments: number },
): Promise<AnswerView> {
  const row = await readyRow(app, actor, id)
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const { bench, summary } = await loadReturn(app, actor, row)
  const decoded = decodedBy(summary, decode)
  const { solutions } = await listedSolutions(app, bench, decoded, { limit: assignments, feasibleOnly: false })
  const lifted = await liftedSolutions(app, bench, solutions)
  const own = solutionViews(bench, solutions, lifted?.rows)
  const rows: readonly SolutionRow[] = lifted ? inOriginal(own) : own
  const groups = groupChecks(await groupsOf(app, bench, lifted?.to ?? null), rows)
  const about = await aboutReturn(app, row, sheet, bench)
  return {
    ...about,
    workspace: await workspaceName(app.db, actor.workspaceId),
    problem: { ...about.problem, interactions: bench.problem.interactions },
    liftedTo: lifted?.to ?? null,
    decode,
    readsKept: readsIn(decoded.states),
    assignments: rows.map((solution, k): AnswerAssignment => ({
      ...solution,
      broken: groups.filter(({ kept }) => !kept[k]).map(({ name }) => name),
    })),
    groups,
    reference: await referenceOfSamples(app, bench, weighted(decoded)),
    readsWithBreak: proportion(summary.breaks.readsWithBreak, summary.breaks.reads),
    runSheet: {
      ...about.runSheet,
      fingerprint: sheet.fingerprint,
      reviewedBy: sheet.reviewedBy ? (await personOf(app.db, sheet.reviewedBy)).name : null,
    },
  }
}
