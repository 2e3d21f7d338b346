import { randomUUID } from 'node:crypto'
import type {
  BridgeSaved,
  BridgeSecret,
  BridgeTest,
  BridgeView,
  MachineBridgeView,
  SaveBridge,
} from '../../shared/schemas/bridges'
import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import { callBridge } from '../bridge/call'
import { refusedReason } from '../bridge/answers'
import { validKeys, withNewKey } from '../bridge/signature'
import type { BridgeRow } from '../database/repositories/bridges'
import { deleteBridge, findBridge, insertBridge, updateBridge } from '../database/repositories/bridges'
import { countAttempt } from './attempts'
import { machineRow } from './machine-graphs'

const MOST_ANSWER_SHOWN = 300
const MOST_TESTS = { most: 20, withinMinutes: 10 }

/** The bridge of a machine. @throws DomainError where the machine is unknown or has none */
async function bridgeRow(app: App, actor: Actor, machineId: string): Promise<BridgeRow> {
  const machine = await machineRow(app, actor, machineId)
  const row = await findBridge(app.db, actor.workspaceId, machineId)
  if (!row) throw new DomainError('wrong state', 'bridge.none', `${machine.name} has no bridge. Set one up first.`)
  return row
}

export async function machineBridge(app: App, actor: Actor, machineId: string): Promise<MachineBridgeView> {
  const { id, name } = await machineRow(app, actor, machineId)
  const row = await findBridge(app.db, actor.workspaceId, machineId)
  return { machine: { id, name }, bridge: row ? viewOf(app, row) : null }
}

const viewOf = (app: App, { kind, url, isOn, keys, lastTest, changedAt }: BridgeRow): BridgeView => ({
  ...{ kind, url, isOn, lastTest },
  keys: validKeys(keys, app.now()).map(({ id, madeAt, endsAt }) => ({ id, madeAt, endsAt })),
  changedAt: changedAt.toISOString(),
})

/** Sets up or changes the bridge of a machine. A secret is made with a team's own one, and shown in this answer only. */
export async function saveBridge(app: App, actor: Actor, machineId: string, input: SaveBridge): Promise<BridgeSaved> {
  const { workspaceId } = actor
  await machineRow(app, actor, machineId)
  const now = app.now()
  const { kind, isOn } = input
  const set = { kind, isOn, url: kind === 'own' ? input.url : null, changedAt: now }
  const before = await findBridge(app.db, workspaceId, machineId)
  const keys = before?.kind === kind ? before.keys : withNewKey([], now)
  if (before) await updateBridge(app.db, before.id, { ...set, keys, lastTest: null })
  else
    await insertBridge(app.db, {
      ...{ id: randomUUID(), workspaceId, machineId, createdBy: actor.userId, createdAt: now },
      ...set,
      keys,
    })
  return { made: kind === 'own' && before?.kind !== kind ? secretOf(keys) : null }
}

const secretOf = ([newest]: BridgeRow['keys']): BridgeSecret => ({ keyId: newest!.id, secret: newest!.secret })

/** Makes a new secret; calls are signed with the one before it for a day longer. */
export async function renewBridgeSecret(app: App, actor: Actor, machineId: string): Promise<BridgeSecret> {
  const row = await bridgeRow(app, actor, machineId)
  if (row.kind !== 'own')
    throw new DomainError('wrong state', 'bridge.built-in', 'The built-in bridge needs no secret of yours.')
  const keys = withNewKey(validKeys(row.keys, app.now()), app.now())
  await updateBridge(app.db, row.id, { keys, changedAt: app.now() })
  return secretOf(keys)
}

export async function removeBridge(app: App, actor: Actor, machineId: string): Promise<void> {
  await deleteBridge(app.db, (await bridgeRow(app, actor, machineId)).id)
}

/** Sends a call that only tries the bridge, and keeps what came of it. */
export async function testBridge(app: App, actor: Actor, machineId: string): Promise<BridgeTest> {
  const row = await bridgeRow(app, actor, machineId)
  const { name } = await machineRow(app, actor, machineId)
  await countAttempt(app, `bridge test ${row.id}`, MOST_TESTS)
  const call = randomUUID()
  const started = performance.now()
  const at = app.now().toISOString()
  const body = JSON.stringify({ event: 'test', call, machine: { name } })
  const outcome = await callBridge(app, row, call, body).then(
    (answer) => ({ status: answer.status, answer: shown(answer.text), reason: refusedReason(answer) }),
    (error: Error) => ({ status: null, answer: '', reason: error.message }),
  )
  const milliseconds = Math.round(performance.now() - started)
  const test = { at, isAnswered: outcome.reason === null, milliseconds, ...outcome }
  await updateBridge(app.db, row.id, { lastTest: test })
  return test
}

/** What may be stored and shown of an answer: no control characters, none that the database does not take. */
const shown = (text: string): string =>
  text
    .replace(/[\p{Cc}\p{Cs}]+/gu, ' ')
    .trim()
    .slice(0, MOST_ANSWER_SHOWN)
    .toWellFormed()
