import { withNames } from '../../shared/mentions'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { ReviewItem } from '../../shared/schemas/reviews'
import type { CheckView } from '../../shared/schemas/run-sheets'
import { settingChanges } from '../../shared/settings-changes'
import type { Actor, App } from '../app'
import { pageOf, positionOf } from '../database/repositories/pages'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { listInReview, submissionsOf } from '../database/repositories/run-sheets'
import { runSheetView } from './run-sheets'

/** Run sheets that wait for a reviewer, the longest waiting first, each with what the decision goes by. */
export async function reviewQueue(app: App, actor: Actor, { limit, cursor }: PageQuery): Promise<Page<ReviewItem>> {
  const offset = positionOf(cursor)
  const page = pageOf(await listInReview(app.db, actor.workspaceId, limit + 1, offset), limit, offset)
  const items: ReviewItem[] = []
  for (const row of page.items) items.push(await reviewItem(app, actor, row))
  return { ...page, items }
}

async function reviewItem(app: App, actor: Actor, row: RunSheetRow): Promise<ReviewItem> {
  const view = await runSheetView(app, actor, row.id)
  const [last, before] = await submissionsOf(app.db, row.id)
  const { id, number, name, state, problem, embedding, machine, reads, machineTimeMilliseconds, changedAt } = view
  const mentioned = view.remarks.flatMap(({ mentions }) => mentions)
  const named = (verdict: CheckView['verdict']) =>
    view.checks.filter((check) => check.verdict === verdict).map(({ what }) => what)
  return {
    ...{ id, number, name, state, problem, embedding, machine, reads, machineTimeMilliseconds, changedAt },
    preparedBy: view.preparedBy,
    isOwn: row.preparedBy === actor.userId,
    submittedAt: (last?.createdAt ?? row.changedAt).toISOString(),
    remark: withNames(last?.text ?? '', mentioned),
    price: view.machineTime.price,
    budget: view.budget,
    checks: { passed: named('passed').length, cautions: named('caution'), refused: named('refused') },
    changes: before?.settings ? settingChanges(before.settings, row.settings) : null,
    madeFrom: view.madeFrom,
  }
}
