import { randomUUID } from 'node:crypto'
import type { z } from 'zod'
import type { duplicateProblemSchema } from '../../shared/schemas/problem-versions'
import type { Actor, App } from '../app'
import { nextNumber } from '../database/repositories/counters'
import { insertProblem } from '../database/repositories/problems'
import { stampOf } from './problem-versions'
import { problemRow } from './problems'

const MAX_NAME = 120

/** `Deck radio channels, copy`, shortened where the name would grow too long. */
export const copyName = (name: string): string => {
  const ending = ', copy'
  return name.slice(0, MAX_NAME - ending.length).trimEnd() + ending
}

/** A problem of its own from one version of another, with its note, tags and confirmed groups. */
export async function duplicateProblem(
  app: App,
  actor: Actor,
  id: string,
  { version, name }: z.infer<typeof duplicateProblemSchema>,
): Promise<{ id: string; number: number }> {
  const row = await problemRow(app, actor, id, version)
  const dataBlobId = await app.blobs.write(await app.blobs.read(row.dataBlobId))
  const { form, sense, variables, interactions, fingerprint, reading, structure, groups } = row
  const { fileName, bytes, sha256 } = row.source
  const source = { fileName, bytes, sha256, copyOf: { id, number: row.number, version: row.version } }
  const copyId = randomUUID()
  const stamp = stampOf(app, actor)
  const made = { createdBy: stamp.versionBy, createdAt: stamp.versionAt, changedAt: stamp.versionAt }
  const number = await app.db.transaction(async (tx) => {
    const number = await nextNumber(tx, actor.workspaceId, 'problem')
    await app.blobs.adopt(tx, dataBlobId)
    await insertProblem(
      tx,
      {
        id: copyId,
        workspaceId: actor.workspaceId,
        number,
        name: name ?? copyName(row.name),
        note: row.note,
        tags: row.tags,
        ...made,
      },
      {
        remark: `copied from P-${row.number}, version ${row.version}`,
        form,
        sense,
        variables,
        interactions,
        dataBlobId,
        fingerprint,
        source,
        // The list of rejected lines goes with the problem that it was made for.
        reading: { ...reading, rejectedBlobId: undefined },
        structure,
        groups,
        ...stamp,
      },
    )
    return number
  })
  return { id: copyId, number }
}
