import { DomainError } from '../../shared/errors'
import type { Page, PageQuery } from '../../shared/schemas/common'
import type { ComparedVersions, DifferenceView, VersionItem } from '../../shared/schemas/problem-versions'
import type { Actor, App } from '../app'
import { pageOf, positionOf } from '../database/repositories/pages'
import { advanceVersion, insertVersion, listVersions } from '../database/repositories/problem-versions'
import type { NewVersion, ProblemRow } from '../database/repositories/problems'
import type { ProblemData } from './problem-data'
import { packProblem } from './problem-data'
import { changeOf, differenceBetween, versionDifference } from './problem-difference'
import { problemData, problemRow } from './problems'

/** What a new version is stored with, besides what follows from its data. */
export type VersionDraft = Omit<NewVersion, 'dataBlobId' | 'fingerprint' | 'versionBy' | 'versionAt'>

/** Fields that say nothing about which version it is. */
type Stamp = Pick<NewVersion, 'versionBy' | 'versionAt'>

export const stampOf = (app: App, actor: Actor): Stamp => ({ versionBy: actor.userId, versionAt: app.now() })

/** @throws DomainError wrong state, naming the version that holds the same already */
function requireNews(row: ProblemRow, fingerprint: string, sense: 'min' | 'max'): void {
  if (row.fingerprint !== fingerprint || row.sense !== sense) return
  throw new DomainError(
    'wrong state',
    'problem.same-version',
    `Nothing changed: version ${row.version} of P-${row.number}, the current one, holds the same labels, coefficients and offset.`,
  )
}

/** @throws DomainError wrong state, when what was to be changed is no longer the current version */
function requireSeen(row: ProblemRow, seen: number | undefined): void {
  if (seen === undefined || row.version === seen) return
  throw new DomainError(
    'wrong state',
    'problem.version-moved',
    `P-${row.number} has come to version ${row.version}; this was about version ${seen}. Look at the current version and do it again.`,
  )
}

/**
 * Stores data as the next version of a problem, whole or not at all. Where another version comes in between, it is
 * compared anew and takes the number after that; given `seen`, it is refused instead.
 */
export async function addVersion(
  app: App,
  actor: Actor,
  problemId: string,
  data: ProblemData,
  draft: VersionDraft,
  seen?: number,
): Promise<{ version: number; difference: DifferenceView }> {
  const { bytes, fingerprint } = packProblem(data)
  let dataBlobId: string | undefined
  for (;;) {
    const row = await problemRow(app, actor, problemId)
    requireSeen(row, seen)
    requireNews(row, fingerprint, draft.sense)
    const before = { ...(await problemData(app, row)), sense: row.sense }
    const difference = await differenceBetween(app, before, { ...data, sense: draft.sense })
    const blobId = (dataBlobId ??= await app.blobs.write(bytes))
    const source = { ...draft.source, change: changeOf(difference) }
    const version = { ...draft, source, dataBlobId: blobId, fingerprint, ...stampOf(app, actor) }
    const isSaved = await app.db.transaction(async (tx) => {
      if (!(await advanceVersion(tx, problemId, row.version, app.now()))) return false
      await app.blobs.adopt(tx, blobId)
      if (draft.reading.rejectedBlobId) await app.blobs.adopt(tx, draft.reading.rejectedBlobId)
      await insertVersion(tx, problemId, row.version + 1, version)
      return true
    })
    if (isSaved) return { version: row.version + 1, difference }
  }
}

/** Versions of a problem, newest first. */
export async function versionsOf(app: App, actor: Actor, id: string, query: PageQuery): Promise<Page<VersionItem>> {
  await problemRow(app, actor, id)
  const position = positionOf(query.cursor)
  const rows = await listVersions(app.db, id, query.limit + 1, position)
  return pageOf(
    rows.map(({ row, by }) => {
      const { change = null, ...source } = row.source
      return {
        version: row.version,
        at: row.versionAt.toISOString(),
        by,
        remark: row.remark,
        source,
        fingerprint: row.fingerprint,
        form: row.form,
        sense: row.sense,
        variables: row.variables,
        interactions: row.interactions,
        change,
      }
    }),
    query.limit,
    position,
  )
}

/** What changed between any two versions of a problem. */
export async function compareVersions(
  app: App,
  actor: Actor,
  id: string,
  { from, to }: { from: number; to: number },
): Promise<ComparedVersions> {
  const [before, after] = [await problemRow(app, actor, id, from), await problemRow(app, actor, id, to)]
  return { from, to, ...(await versionDifference(app, before, after)) }
}
