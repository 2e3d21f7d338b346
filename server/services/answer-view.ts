import { holds } from '../../shared/engine/problem/groups/group'
import type { AnswerAssignment, AnswerView, GroupCheck } from '../../shared/schemas/answers'
import type { ConstraintGroup } from '../../shared/schemas/problems'
import type { Decoding, SolutionRow } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import { workspaceName } from '../database/repositories/answer-sheets'
import { personOf } from '../database/repositories/problems'
import { loadReturn, readyRow } from './loaded-return'
import type { Bench } from './programming'
import { returnView } from './return-view'
import { inOriginal, solutionsOf } from './return-solutions'
import { runSheetRow } from './run-sheets'

/** Each confirmed group, looked up in the assignments themselves. */
function groupChecks({ labels, problem }: Bench, rows: readonly SolutionRow[]): GroupCheck[] {
  const groups: readonly ConstraintGroup[] = problem.groups ?? []
  return groups.map((group) => {
    const atOne = rows.map(({ assignment }) => group.members.filter((i) => assignment[labels[i]!] === 1).length)
    const { name, kind, k, members } = group
    return { name, kind, k, members: members.length, atOne, kept: atOne.map((count) => holds(group, count)) }
  })
}

/** The best assignments of a return with what is known of them, for the person who asked. */
export async function answerView(
  app: App,
  actor: Actor,
  id: string,
  { decode, assignments }: { decode: Decoding; assignments: number },
): Promise<AnswerView> {
  const row = await readyRow(app, actor, id)
  const { bench } = await loadReturn(app, actor, row)
  const view = await returnView(app, actor, id, decode, false)
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const rows = await solutionsOf(app, actor, id, { decode, limit: assignments, feasibleOnly: false })
  const groups = groupChecks(bench, rows)
  const shown: readonly SolutionRow[] = view.liftedTo ? inOriginal(rows) : rows
  const { problem, ofVersion, liftedTo, reads, reference, source, made, machine, embedding, number, version } = view
  return {
    workspace: await workspaceName(app.db, actor.workspaceId),
    problem: { ...problem, interactions: bench.problem.interactions },
    ofVersion,
    liftedTo,
    decode,
    reads,
    readsKept: view.decodings.find(({ decoding }) => decoding === decode)!.readsKept,
    assignments: shown.map((solution, k): AnswerAssignment => ({
      ...solution,
      broken: groups.filter(({ kept }) => !kept[k]).map(({ name }) => name),
    })),
    groups,
    reference,
    source,
    readsWithBreak: view.breaks!.readsWithBreak,
    made,
    runSheet: {
      number: sheet.number,
      name: sheet.name,
      fingerprint: sheet.fingerprint,
      reviewedBy: sheet.reviewedBy ? (await personOf(app.db, sheet.reviewedBy)).name : null,
    },
    machine,
    embedding: { number: embedding.number },
    number,
    version,
    createdAt: view.createdAt,
  }
}
