import { TooManyError } from '../../shared/errors'
import type { App } from '../app'
import { addAttempt, deleteOverAttempts } from '../database/repositories/attempts'

/** So many within so long. */
export interface AttemptLimit {
  most: number
  withinMinutes: number
}

/**
 * Counts an attempt before it is made, so that many at once are not let through.
 * @throws TooManyError beyond the limit, with the seconds until counting begins anew
 */
export async function countAttempt(app: App, key: string, { most, withinMinutes }: AttemptLimit): Promise<void> {
  const now = app.now()
  const { count, resetsAt } = await addAttempt(app.db, key, now, new Date(now.getTime() + withinMinutes * 60_000))
  if (count <= most) return
  const seconds = Math.max(1, Math.ceil((resetsAt.getTime() - now.getTime()) / 1000))
  throw new TooManyError(
    'attempts.many',
    `Too many attempts. Wait ${Math.ceil(seconds / 60)} min and try again.`,
    seconds,
  )
}

export const sweepAttempts = (app: App): Promise<void> => deleteOverAttempts(app.db, app.now())
