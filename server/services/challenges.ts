import { DomainError } from '../../shared/errors'
import type { App } from '../app'
import type { ChallengeRow } from '../database/repositories/challenges'
import { deleteExpiredChallenges, insertChallenge, takeChallengeRow } from '../database/repositories/challenges'
import { newSecret, secretHash } from './secrets'

const OPEN_MS = 5 * 60 * 1000

/** Opens a challenge for five minutes. @returns what the browser has to bring with its answer */
export async function openChallenge(
  app: App,
  asked: Pick<ChallengeRow, 'purpose' | 'userId' | 'challenge'>,
): Promise<string> {
  const { secret, tokenHash } = newSecret()
  await insertChallenge(app.db, { ...asked, tokenHash, expiresAt: new Date(app.now().getTime() + OPEN_MS) })
  return secret
}

/**
 * What was asked, once: whoever brings the same challenge again is refused, whatever came of the first time.
 * @throws DomainError not acceptable, the same for one that is unknown, has expired or was used
 */
export async function takeChallenge(app: App, purpose: ChallengeRow['purpose'], secret: string): Promise<ChallengeRow> {
  const row = await takeChallengeRow(app.db, purpose, secretHash(secret), app.now())
  if (row) return row
  throw new DomainError('not acceptable', 'challenge.gone', 'This took longer than five minutes. Begin again.')
}

export const sweepChallenges = (app: App): Promise<void> => deleteExpiredChallenges(app.db, app.now())
