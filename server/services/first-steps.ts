import type { FirstStepsView } from '../../shared/schemas/first-steps'
import type { Actor, App } from '../app'
import { newestOwnWork } from '../database/repositories/first-steps'
import { readFact } from '../database/repositories/people'

/** When the demo workspace was filled: what its people are said to have made before was not made by whoever looks. */
export const SEEDED_AT = 'demo seeded at'

/** How far a person has come with the main job, from what they made. */
export async function firstStepsOf(app: App, { userId, workspaceId }: Actor): Promise<FirstStepsView> {
  const seededAt = app.demo ? await readFact(app.db, SEEDED_AT) : undefined
  const done = await newestOwnWork(app.db, { userId, workspaceId, since: new Date(seededAt ?? 0) })
  return { demo: app.demo, done }
}
