import { TAG_LIMITS, tagKey } from '../../shared/library'
import { DomainError } from '../../shared/errors'
import type { EditTags } from '../../shared/schemas/library'
import type { Db } from '../database/client'
import { countTags } from '../database/repositories/library'
import { holdTags, setTags } from '../database/repositories/problems'

/**
 * The tags after a change. Tags differ by more than case; one that is new to the problem is spelt as the workspace
 * spells it already.
 * @throws DomainError when there would be too many
 */
export function changedTags(tags: readonly string[], { add, remove }: EditTags, inUse: readonly string[]): string[] {
  const gone = new Set(remove.map(tagKey))
  const spelling = new Map(inUse.map((tag) => [tagKey(tag), tag]))
  const kept = new Map(tags.filter((tag) => !gone.has(tagKey(tag))).map((tag) => [tagKey(tag), tag]))
  for (const tag of add) if (!kept.has(tagKey(tag))) kept.set(tagKey(tag), spelling.get(tagKey(tag)) ?? tag)
  if (kept.size <= TAG_LIMITS.count) return [...kept.values()]
  const message = `at most ${TAG_LIMITS.count} tags; this would make ${kept.size}`
  throw new DomainError('not acceptable', 'problem.tags', `A problem has ${message}. Take some away first.`, [
    { path: 'tags.add', message },
  ])
}

/** Adds tags to a problem and takes others away, one change after the other with those of other people. */
export async function changeTags(tx: Db, workspaceId: string, id: string, edit: EditTags): Promise<void> {
  const tags = await holdTags(tx, id)
  if (!tags) throw new DomainError('not found', 'problem.unknown', 'There is no such problem in this workspace.')
  const inUse = await countTags(tx, workspaceId)
  await setTags(
    tx,
    id,
    changedTags(
      tags,
      edit,
      inUse.map(({ tag }) => tag),
    ),
  )
}
