import { createHmac } from 'node:crypto'
import { eq } from 'drizzle-orm'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { readZip } from '../../shared/engine/formats/archive'
import type { BridgeReturn } from '../../shared/schemas/bridges'
import { saveBridgeSchema } from '../../shared/schemas/bridges'
import { uploadReturnSchema } from '../../shared/schemas/returns'
import type { RunSheetView } from '../../shared/schemas/run-sheets'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import { outboxQuerySchema } from '../../shared/schemas/mail'
import type { Actor, App } from '../../server/app'
import { addressRules } from '../../server/bridge/addresses'
import { createOutbound } from '../../server/bridge/outbound'
import { sendDueCalls } from '../../server/bridge/sender'
import { claimDueCall } from '../../server/database/repositories/bridge-calls'
import { bridgeCalls, returns } from '../../server/database/schema'
import { issueRunSheet, sendByBridge } from '../../server/services/bridge-calls'
import { callOfToken, takeRefusal, takeSamples } from '../../server/services/bridge-returns'
import { saveBridge } from '../../server/services/bridges'
import { importEmbedding } from '../../server/services/embedding-import'
import { outboxOf } from '../../server/services/mail'
import { handOver } from '../../server/services/review'
import { uploadReturn } from '../../server/services/returns'
import { createRunSheet, runSheetView } from '../../server/services/run-sheets'
import { asStoredFile } from '../../server/services/stored-files'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import type { FakeBridge } from '../support/fake-bridge'
import { startFakeBridge } from '../support/fake-bridge'
import { newMember } from '../support/people'

const MINUTE = 60_000
const SAMPLES = Buffer.from('0,1,2,3\n1,1,-1,-1\n1,1,1,1\n')
const OTHER_SAMPLES = Buffer.from('0,1,2,3\n-1,-1,-1,-1\n')

let test: TestApp
let app: App
let bridge: FakeBridge
let secret: string
let reviewer: Actor
let machineId: string
let embeddingId: string
const save = (input: object) => saveBridge(app, test.actor, machineId, saveBridgeSchema.parse(input))
beforeAll(async () => {
  test = await startTestApp(1)
  app = { ...test.app, outbound: createOutbound(addressRules('127.0.0.1'), 3000) }
  bridge = await startFakeBridge()
  reviewer = await newMember(app, test.actor, 'Reviewer', ['reviewer'])
  machineId = await test.machine({ kind: 'square', width: 4, height: 1 })
  const problemId = await test.problem('# form: ising\na b 1\n')
  const chains = { a: [0, 1], b: [2, 3] }
  embeddingId = (await importEmbedding(app, test.actor, { problemId, machineId, chains })).id
  secret = (await save({ kind: 'own', url: bridge.url })).made!.secret
})
afterAll(async () => {
  bridge.close()
  await test.close()
})
const usual: FakeBridge['answer'] = (response) => response.writeHead(202).end('taken')
beforeEach(async () => {
  await app.db.delete(bridgeCalls)
  await save({ kind: 'own', url: bridge.url })
  bridge.answer = usual
  bridge.received.length = 0
})

/** The same application some minutes later. */
const at = (minutes: number): App => ({ ...app, now: () => new Date(Date.now() + minutes * MINUTE) })

async function approved(): Promise<string> {
  const { id } = await createRunSheet(app, test.actor, createRunSheetSchema.parse({ embeddingId, reads: 50 }))
  await handOver(app, test.actor, id, 'submit', '')
  await handOver(app, reviewer, id, 'approve', '')
  return id
}
async function issued(): Promise<string> {
  const id = await approved()
  await issueRunSheet(app, test.actor, id, { remark: '', byBridge: true })
  return id
}
const view = (id: string): Promise<RunSheetView> => runSheetView(app, test.actor, id)
const callOf = async (id: string) => (await view(id)).call!

interface Run {
  event: string
  call: string
  runSheet: { id: string; reads: number }
  return: { samplesUrl: string; refusalUrl: string; token: string; expiresAt: string }
  bundle: { fileName: string; base64: string }
}
const sent = (index = -1): Run => JSON.parse(bridge.received.at(index)!.body) as Run

const callIn = ({ return: { samplesUrl } }: Run): string => /bridge-calls\/([\w-]+)\/samples$/.exec(samplesUrl)![1]!

async function give(run: Run, bytes = SAMPLES, later = app, options: object = {}): Promise<BridgeReturn> {
  const call = await callOfToken(later, callIn(run), run.return.token)
  return asStoredFile('samples.csv', bytes, (file) => takeSamples(later, call, file, uploadReturnSchema.parse(options)))
}
/** Letters on bridges that say something. */
const lettersOf = async (words: string) =>
  (await outboxOf(app, test.actor, outboxQuerySchema.parse({ limit: 200 }))).items.filter(
    ({ kind, subject, text }) => kind === 'bridge' && `${subject} ${text}`.includes(words),
  )

describe('a run sheet that is issued by the bridge', () => {
  it('is sent once, signed, with its bundle and a token', async () => {
    const id = await issued()
    expect(await view(id)).toMatchObject({ state: 'issued', bridge: { kind: 'own', host: new URL(bridge.url).host } })
    expect(await callOf(id)).toMatchObject({ state: 'waiting', tries: [], isResendable: false })
    await sendDueCalls(app)
    await sendDueCalls(at(10_000))
    expect(bridge.received).toHaveLength(1)
    const { headers, body } = bridge.received[0]!
    const signature = createHmac('sha256', secret)
      .update(`${String(headers['espalier-timestamp'])}.${body}`)
      .digest('hex')
    expect(headers['espalier-signature']).toMatch(new RegExp(`^[0-9a-f]{8}=${signature}$`))
    const run = sent()
    expect(run).toMatchObject({ event: 'run', call: headers['espalier-call'], runSheet: { id, reads: 50 } })
    expect(run.return.samplesUrl).toMatch(/^http:\/\/.+\/api\/bridge-calls\/[\w-]+\/samples$/)
    const files = readZip(Buffer.from(run.bundle.base64, 'base64'), (name) => name.endsWith('/problem.json'))
    expect(JSON.parse(new TextDecoder().decode([...files.values()][0]!))).toMatchObject({
      J: [[0, 1, expect.any(Number)], expect.anything(), expect.anything()],
    })
    expect(await callOf(id)).toMatchObject({ state: 'taken', tries: [{ status: 202, reason: null }] })
    expect(JSON.stringify(await app.db.select().from(bridgeCalls))).not.toContain(run.return.token)
  })

  it('needs a bridge that is on, and is issued as before without one', async () => {
    const id = await approved()
    await save({ kind: 'own', url: bridge.url, isOn: false })
    await expect(issueRunSheet(app, test.actor, id, { remark: '', byBridge: true })).rejects.toThrow(
      'no bridge that is on',
    )
    expect(await view(id)).toMatchObject({ state: 'approved', bridge: null, call: null })
    await issueRunSheet(app, test.actor, id, { remark: '', byBridge: false })
    expect(await view(id)).toMatchObject({ state: 'issued', call: null })
    await expect(sendByBridge(app, test.actor, id)).rejects.toThrow('no bridge that is on')
    await save({ kind: 'own', url: bridge.url })
    await sendByBridge(app, test.actor, id)
    await expect(sendByBridge(app, test.actor, id)).rejects.toThrow('on its way already')
    expect(await callOf(id)).toMatchObject({ state: 'waiting' })
    await expect(sendByBridge(app, { ...test.actor, workspaceId: 'elsewhere' }, id)).rejects.toThrow(
      'no such run sheet',
    )
  })

  it('is sent by one of several that look at once', async () => {
    bridge.answer = (response) => setTimeout(() => usual(response, bridge.received[0]!), 300)
    const ids = [await issued(), await issued()]
    await Promise.all([sendDueCalls(app), sendDueCalls(app), sendDueCalls(app)])
    expect(bridge.received.map(({ body }) => (JSON.parse(body) as Run).runSheet.id).sort()).toEqual(ids.sort())
  })

  it('is tried again when the process that sent it was lost', async () => {
    const id = await issued()
    expect(await claimDueCall(app.db, app.now(), new Date(Date.now() + 5 * MINUTE))).toMatchObject({ attempts: 1 })
    await sendDueCalls(at(4))
    expect(bridge.received).toHaveLength(0)
    await sendDueCalls(at(6))
    expect(bridge.received).toHaveLength(1)
    expect(await callOf(id)).toMatchObject({ state: 'taken' })
  })

  it('survives a restart', async () => {
    const id = await issued()
    const { outbound } = app
    test = await test.restarted(1)
    app = { ...test.app, outbound }
    await sendDueCalls(app)
    expect(await callOf(id)).toMatchObject({ state: 'taken' })
  })
})

describe('a bridge that does not take it', () => {
  it('is asked again after 1, 5 and 15 minutes and given up at the eighth try, which is told; then it can be sent again', async () => {
    bridge.answer = (response) => response.writeHead(503).end()
    await newMember(app, test.actor, 'Owner', ['owner'])
    const id = await issued()
    for (const [minutes, tries] of [
      ...([
        [0, 1],
        [0.5, 1],
        [1.1, 2],
        [6, 2],
        [6.2, 3],
        [21.3, 4],
      ] as const),
      ...([
        [82, 5],
        [263, 6],
        [624, 7],
        [1300, 7],
        [1345, 8],
      ] as const),
    ]) {
      await sendDueCalls(at(minutes))
      expect((await callOf(id)).tries.length, `after ${minutes} min`).toBe(tries)
    }
    expect(await callOf(id)).toMatchObject({ state: 'given up', nextAttemptAt: null, isResendable: true })
    const told = await lettersOf('it answered 503')
    expect(told.map(({ to }) => to.name).sort()).toEqual(['Developer', 'Owner'])
    await sendByBridge(app, test.actor, id)
    await sendDueCalls(app)
    expect(await callOf(id)).toMatchObject({ state: 'waiting', nextAttemptAt: expect.any(String) })
    bridge.answer = usual
    await sendDueCalls(at(2))
    expect(await callOf(id)).toMatchObject({ state: 'taken' })
    expect(sent(1).call).toBe(sent(0).call)
    expect(sent().call).not.toBe(sent(0).call)
    // Every try has its own token; any of them opens the call, and the first that is used ends it.
    const first = sent(0)
    expect((await give(first)).reads).toBe(2)
    await expect(give(sent(), OTHER_SAMPLES)).rejects.toThrow('works once')
  })

  it.each([
    [400, {}, 'it answered 400'],
    [307, { location: 'https://elsewhere.example/' }, 'a redirect to https://elsewhere.example/'],
  ])('and says so for good, with %i, is not asked again', async (status, headers, reason) => {
    bridge.answer = (response) => response.writeHead(status, headers).end()
    const id = await issued()
    await sendDueCalls(app)
    const call = await callOf(id)
    expect(call).toMatchObject({ state: 'given up', tries: [{ status }] })
    expect(call.tries[0]!.reason).toContain(reason)
    await sendDueCalls(at(10_000))
    expect(bridge.received).toHaveLength(1)
  })

  it('because its address is not public is not called at all', async () => {
    const id = await issued()
    await sendDueCalls(test.app)
    expect(await callOf(id)).toMatchObject({
      state: 'given up',
      tries: [{ status: null, reason: '127.0.0.1 is not an address of the public internet' }],
    })
    expect(bridge.received).toHaveLength(0)
  })

  it('because it was removed or turned off meanwhile leaves a reason', async () => {
    const id = await issued()
    await save({ kind: 'own', url: bridge.url, isOn: false })
    await sendDueCalls(app)
    expect((await callOf(id)).tries[0]!.reason).toContain('has no bridge that is on')
  })
})

describe('samples that a bridge sends back', () => {
  it('are taken as an upload is, once; the same again get the same answer', async () => {
    const id = await issued()
    await sendDueCalls(app)
    const taken = await give(sent())
    expect(await give(sent())).toEqual(taken)
    await expect(give(sent(), OTHER_SAMPLES)).rejects.toThrow('works once')
    const sheet = await view(id)
    expect(sheet).toMatchObject({ state: 'returned', call: { state: 'returned', returnId: taken.id } })
    expect(sheet.returns).toMatchObject([{ id: taken.id, source: 'upload', byBridge: true, reads: 2 }])
    expect(await lettersOf(`RS-${sheet.number} has samples back`)).toHaveLength(1)
  })

  it('twice at the same moment are stored once', async () => {
    const id = await issued()
    await sendDueCalls(app)
    const [one, other] = await Promise.all([give(sent()), give(sent())])
    expect(one).toEqual(other)
    expect(await app.db.select().from(returns).where(eq(returns.runSheetId, id))).toHaveLength(1)
  })

  it('while the call is still open count, whatever the answer to the call', async () => {
    let taken: BridgeReturn | undefined
    bridge.answer = async (response, { body }) => {
      taken = await give(JSON.parse(body) as Run)
      response.writeHead(500).end()
    }
    const id = await issued()
    await sendDueCalls(app)
    expect(await callOf(id)).toMatchObject({ state: 'returned', returnId: taken!.id, nextAttemptAt: null })
  })

  it('are refused with a wrong token, another call’s, or none', async () => {
    await issued()
    await issued()
    await sendDueCalls(app)
    const [one, other] = [sent(0), sent(1)]
    for (const token of [undefined, 'x', other.return.token, one.return.token.slice(0, -1)])
      await expect(callOfToken(app, callIn(one), token)).rejects.toThrow('no token of this call')
    await expect(callOfToken(app, 'unknown', one.return.token)).rejects.toThrow('no token of this call')
  })

  it('are refused seven days after the call; it can then be sent again', async () => {
    const id = await issued()
    await sendDueCalls(app)
    const late = at(7 * 24 * 60 + 1)
    await expect(give(sent(), SAMPLES, late)).rejects.toThrow('This token held until')
    expect((await runSheetView(late, test.actor, id)).call).toMatchObject({ state: 'taken', isResendable: true })
    await sendByBridge(late, test.actor, id)
  })

  it('that cannot be read leave the call as it is', async () => {
    const id = await issued()
    await sendDueCalls(app)
    await expect(give(sent(), Buffer.from('0,1,2\n1,1,1\n'))).rejects.toMatchObject({ code: 'samples.refused' })
    expect(await callOf(id)).toMatchObject({ state: 'taken' })
    expect((await give(sent())).reads).toBe(2)
  })

  it('come too late when they were loaded by hand', async () => {
    const id = await issued()
    await sendDueCalls(app)
    await asStoredFile('by-hand.csv', OTHER_SAMPLES, (file) =>
      uploadReturn(app, test.actor, id, file, uploadReturnSchema.parse({})),
    )
    expect(await callOf(id)).toMatchObject({ state: 'ended', isResendable: false })
    await expect(give(sent())).rejects.toThrow('loaded by hand')
  })
})

describe('a bridge that refuses a run', () => {
  it('says why, and it can be sent again', async () => {
    const id = await issued()
    await sendDueCalls(app)
    const call = () => callOfToken(app, callIn(sent()), sent().return.token)
    await takeRefusal(app, await call(), 'The machine is cooling down.')
    await takeRefusal(app, await call(), 'The machine is cooling down.')
    await expect(takeRefusal(app, await call(), 'Something else.')).rejects.toThrow('refused before')
    await expect(give(sent())).rejects.toThrow('refused before')
    expect(await callOf(id)).toMatchObject({
      state: 'refused',
      refusal: 'The machine is cooling down.',
      isResendable: true,
    })
    expect(await lettersOf('The machine is cooling down.')).toHaveLength(1)
    await sendByBridge(app, test.actor, id)
    await sendDueCalls(app)
    expect((await give(sent())).reads).toBe(2)
  })
})

describe('the built-in bridge', () => {
  it('gives a rehearsal back, which is never taken for samples of the machine', async () => {
    await save({ kind: 'rehearsal' })
    const id = await issued()
    await sendDueCalls(app)
    const sheet = await view(id)
    expect(sheet).toMatchObject({ state: 'issued', call: { kind: 'rehearsal', state: 'returned', isResendable: true } })
    expect(sheet.returns).toMatchObject([{ source: 'rehearsal', byBridge: true, reads: 50, best: -1 }])
    expect(await lettersOf('The machine has not run it.')).toHaveLength(1)
    expect(await lettersOf(`RS-${sheet.number} has samples back`)).toHaveLength(0)
    // A machine's own bridge takes its place, and what it sends are samples.
    await save({ kind: 'own', url: bridge.url })
    await sendByBridge(app, test.actor, id)
    await sendDueCalls(app)
    await give(sent())
    expect(await view(id)).toMatchObject({
      state: 'returned',
      returns: [{ source: 'upload' }, { source: 'rehearsal' }],
    })
  })

  it('does not make a rehearsal of what the team’s own bridge was asked for', async () => {
    bridge.answer = (response) => response.writeHead(503).end()
    await issued()
    await sendDueCalls(app)
    await save({ kind: 'rehearsal' })
    await sendDueCalls(at(2))
    await expect(give(sent())).rejects.toThrow('no token of this call')
  })
})
