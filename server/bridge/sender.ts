import type { App } from '../app'
import { keepTries, claimDueCall, updateClaimed } from '../database/repositories/bridge-calls'
import type { BridgeCallRow } from '../database/repositories/bridge-calls'
import { readFact } from '../database/repositories/people'
import { POST_FACT, postOf } from '../mail/post'
import type { Rounds } from '../rounds'
import { keepGoingRound } from '../rounds'
import { tellOfCall } from '../services/bridge-letters'
import { sheetToSend } from '../services/bridge-calls'
import type { SheetToSend } from '../services/bridge-calls'
import { newSecret } from '../services/secrets'
import { outcomeOf } from './answers'
import type { TryOutcome } from './answers'
import { callBridge } from './call'
import type { OutboundAnswer } from './outbound'

const LOOK_MS = 2_000
/** Calls on their way at the same time, so that one slow bridge does not hold up the others. */
const LANES = 3
/** A try that has not ended by then was lost with its process; longer than preparing and sending may take. */
const LOST_MS = 5 * 60_000
const TOKEN_PREFIX = 'espalier_run_'
const TOKEN_DAYS = 7
const DAY_MS = 86_400_000
/** Tokens and tries that are kept of a call. */
const MOST_KEPT = 20

/** A try that somebody else has taken over meanwhile, or that is not needed any more. */
class Overtaken extends Error {}

interface Token {
  token: string
  expiresAt: Date
}

/** Makes a token for what comes back, known before the bridge can use it. */
async function withToken(app: App, call: BridgeCallRow, { bridge }: SheetToSend): Promise<Token> {
  const now = app.now()
  const { secret: token, tokenHash } = newSecret(TOKEN_PREFIX)
  const expiresAt = new Date(now.getTime() + TOKEN_DAYS * DAY_MS)
  // What another kind of bridge was given is no longer taken: it decides what samples are.
  const earlier = call.kind === bridge.kind ? call.tokenHashes : []
  const kept = await updateClaimed(app.db, call, {
    kind: bridge.kind,
    tokenHashes: [...earlier, tokenHash].slice(-MOST_KEPT),
    tokenExpiresAt: expiresAt,
    nextAttemptAt: new Date(now.getTime() + LOST_MS),
  })
  if (!kept) throw new Overtaken()
  return { token, expiresAt }
}

/** The same at every try, another when somebody sends it again: a bridge runs each once. */
const sendingId = ({ id, earlierAttempts }: BridgeCallRow): string => `${id}-${earlierAttempts}`

/** The body of a call that runs a sheet. */
function bodyOf(call: BridgeCallRow, { sheet, machine, bundle }: SheetToSend, site: string, token: Token): string {
  const at = `${site}/api/bridge-calls/${call.id}`
  return JSON.stringify({
    event: 'run',
    call: sendingId(call),
    machine: { name: machine.name },
    runSheet: { id: sheet.id, number: sheet.number, name: sheet.name, reads: sheet.settings.reads },
    return: {
      samplesUrl: `${at}/samples`,
      refusalUrl: `${at}/refusal`,
      token: token.token,
      expiresAt: token.expiresAt.toISOString(),
    },
    bundle: { fileName: bundle.fileName, base64: Buffer.from(bundle.bytes).toString('base64') },
  })
}

async function answerOf(app: App, call: BridgeCallRow): Promise<OutboundAnswer | Error> {
  try {
    const sending = await sheetToSend(app, call)
    const token = await withToken(app, call, sending)
    const { site } = postOf(await readFact(app.db, POST_FACT))
    return await callBridge(app, sending.bridge, sendingId(call), bodyOf(call, sending, site, token))
  } catch (error) {
    if (error instanceof Overtaken) throw error
    return error instanceof Error ? error : new Error(String(error))
  }
}

async function attempt(app: App, call: BridgeCallRow): Promise<void> {
  const at = app.now()
  const started = performance.now()
  const answer = await answerOf(app, call)
  const outcome = outcomeOf(answer, call.attempts - call.earlierAttempts, app.now())
  const tried = {
    at: at.toISOString(),
    milliseconds: Math.round(performance.now() - started),
    status: answer instanceof Error ? null : answer.status,
    reason: outcome.reason,
  }
  await keepTries(app.db, call.id, [...call.tries, tried].slice(-MOST_KEPT))
  await settle(app, call, outcome)
}

/** What came for the call while it was sent says more than the answer to sending it. */
async function settle(app: App, call: BridgeCallRow, outcome: TryOutcome): Promise<void> {
  const { state } = outcome
  const nextAttemptAt = state === 'waiting' ? outcome.nextAttemptAt : null
  await app.db.transaction(async (tx) => {
    const settled = await updateClaimed(tx, call, { state, nextAttemptAt })
    if (settled && state === 'given up') await tellOfCall(app, tx, call, { what: 'given up', said: outcome.reason })
  })
}

/**
 * Sends every call that is due. A call is sent at least once: where the process ends between the bridge's yes and our note
 * of it, it goes again, under the same id.
 * @param stopped asked before each call
 */
export async function sendDueCalls(app: App, stopped: () => boolean = () => false): Promise<void> {
  const lane = async (): Promise<void> => {
    while (!stopped()) {
      const now = app.now()
      const call = await claimDueCall(app.db, now, new Date(now.getTime() + LOST_MS))
      if (!call) return
      await attempt(app, call).catch((error) => {
        if (!(error instanceof Overtaken)) throw error
      })
    }
  }
  await Promise.all(Array.from({ length: LANES }, lane))
}

/** Sends calls as long as this process lives. */
export const openSender = (app: App): Rounds =>
  keepGoingRound('bridge', LOOK_MS, (stopped) => sendDueCalls(app, stopped))
