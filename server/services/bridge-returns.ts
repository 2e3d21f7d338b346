import { createHash } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { BridgeReturn } from '../../shared/schemas/bridges'
import type { UploadReturn } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import type { BridgeCallRow } from '../database/repositories/bridge-calls'
import { answerCall, findCall } from '../database/repositories/bridge-calls'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { findReturn } from '../database/repositories/run-sheets'
import { tellOfCall } from './bridge-letters'
import { uploadReturn } from './returns'
import { runSheetRow } from './run-sheets'
import { secretHash } from './secrets'
import type { StoredFile } from './stored-files'

/**
 * The call that a token belongs to, whether or not it is still of use.
 * @throws DomainError unauthenticated, the same for an unknown call and for a wrong token
 */
export async function callOfToken(app: App, id: string, token: string | undefined): Promise<BridgeCallRow> {
  const call = token === undefined ? undefined : await findCall(app.db, id)
  if (call?.tokenHashes.includes(secretHash(token!))) return call
  throw new DomainError('unauthenticated', 'bridge-call.token', 'This is no token of this call.')
}

const CLOSED: Partial<Record<BridgeCallRow['state'], string>> = {
  returned: 'Other samples came back by this call before, and its token works once.',
  refused: 'This call was refused before, and its token works once.',
  ended: 'Samples of this run sheet were loaded by hand, which ended the call.',
}

const closed = (state: BridgeCallRow['state']): DomainError =>
  new DomainError('wrong state', 'bridge-call.over', CLOSED[state] ?? 'Nothing is awaited by this call any more.')

/** @throws DomainError where nothing is awaited any more */
function requireAwaited(app: App, { state, tokenExpiresAt }: BridgeCallRow): void {
  if (CLOSED[state]) throw closed(state)
  if (tokenExpiresAt && tokenExpiresAt <= app.now())
    throw new DomainError(
      'unauthenticated',
      'bridge-call.expired',
      `This token held until ${tokenExpiresAt.toISOString()}. Ask for the run sheet to be sent again.`,
    )
}

const digestOf = (options: UploadReturn, { sha256 }: StoredFile): string =>
  createHash('sha256')
    .update(`${JSON.stringify(options)} ${sha256}`)
    .digest('hex')

const actorOf = ({ createdBy, workspaceId }: BridgeCallRow): Actor => ({ userId: createdBy, workspaceId })

/** The answer of before to the same samples; undefined where none came, or others. */
async function answeredBefore(app: App, call: BridgeCallRow, digest: string): Promise<BridgeReturn | undefined> {
  if (call.state !== 'returned' || call.returnedDigest !== digest || !call.returnId) return undefined
  const row = await findReturn(app.db, call.workspaceId, call.returnId)
  return row && { id: row.id, reads: row.reads }
}

/**
 * Takes samples that a bridge sends back, once, in the way of an upload. Those of the built-in bridge are a rehearsal.
 * @param rehearsed what made the samples of a rehearsal
 * @throws DomainError as `uploadReturn`, and where other samples came before, or the token has expired
 */
export async function takeSamples(
  app: App,
  call: BridgeCallRow,
  file: StoredFile,
  options: UploadReturn,
  rehearsed?: ReturnRow['made'],
): Promise<BridgeReturn> {
  const digest = digestOf(options, file)
  const before = await answeredBefore(app, call, digest)
  if (before) return before
  requireAwaited(app, call)
  const actor = actorOf(call)
  const sheet = await runSheetRow(app, actor, call.runSheetId)
  if (sheet.state !== 'issued') throw closed('ended')
  try {
    const { id, reads } = await uploadReturn(app, actor, sheet.id, file, options, {
      source: call.kind === 'rehearsal' ? 'rehearsal' : 'upload',
      made: { ...rehearsed, byBridge: true },
      async note(tx, returnId) {
        if (!(await answerCall(tx, call.id, { state: 'returned', returnId, returnedDigest: digest })))
          throw closed('returned')
        await tellOfCall(app, tx, call, { what: call.kind === 'rehearsal' ? 'rehearsed' : 'returned', said: null })
      },
    })
    return { id, reads }
  } catch (error) {
    // The same may have been sent twice at once.
    const now = await findCall(app.db, call.id)
    const same = now && (await answeredBefore(app, now, digest))
    if (same) return same
    throw error
  }
}

/** Notes that the machine does not run a sheet, and why; said again in the same words, nothing happens. */
export async function takeRefusal(app: App, call: BridgeCallRow, reason: string): Promise<void> {
  if (call.state === 'refused' && call.refusal === reason) return
  requireAwaited(app, call)
  await app.db.transaction(async (tx) => {
    if (!(await answerCall(tx, call.id, { state: 'refused', refusal: reason }))) throw closed('returned')
    await tellOfCall(app, tx, call, { what: 'refused', said: reason })
  })
}
