import { DEMO_PASSWORD } from '../../../shared/demo-accounts'
import { createRandom } from '../../../shared/engine/random'
import type { PasskeyChallenge } from '../../../shared/schemas/passkeys'
import { authenticator } from '../authenticator'
import { Client } from '../client'
import { until } from '../server'

/**
 * Brings a demo workspace into states that the seeds leave out, through the routes that people use: the pages of these
 * states are then found by following links like all others.
 */
export async function prepareStates(url: string): Promise<void> {
  const developer = await Client.signedIn(url, 'developer')
  const steward = await Client.signedIn(url, 'steward')
  const reviewer = await Client.signedIn(url, 'reviewer')
  await prepareProblems(developer)
  const { small, machine, embedding } = await prepareEmbeddings(developer, steward)
  await prepareRunSheets(developer, reviewer, embedding)
  await prepareBridges(developer, reviewer, steward, machine, embedding)
  await prepareBroken(developer, steward, small, machine)
  await preparePeople(url, developer, reviewer)
  await created(developer.post('/api/tokens', { name: 'nightly rehearsals', role: 'developer' }))
}

export interface Running {
  /** Addresses of pages that show it, and of those that no page links to. */
  readonly paths: string[]
  stop(): Promise<void>
}

/** Starts work that is still under way when it is looked at. */
export async function prepareRunning(url: string): Promise<Running> {
  const developer = await Client.signedIn(url, 'developer')
  const machines = await created<{ items: { id: string; qubits: number }[] }>(developer.get('/api/machines'), 200)
  const largest = machines.items.sort((a, b) => b.qubits - a.qubits)[0]!
  const dense = await problem(developer, 'Too dense to find at once', randomLines(90, 0.4, 3))
  const search = await created<{ jobId: string; id: string }>(
    developer.post('/api/embeddings', {
      problemId: dense,
      machineId: largest.id,
      method: 'search',
      tries: 1,
      timeLimitSeconds: 300,
    }),
    202,
  )
  const sheets = await created<{ items: { id: string; state: string }[] }>(developer.get('/api/run-sheets'), 200)
  const approved = sheets.items.find(({ state }) => state === 'approved')!
  const rehearsal = await created<{ jobId: string; returnId: string }>(
    developer.post(`/api/run-sheets/${approved.id}/rehearsals`, { reads: 100_000, sweeps: 1_000_000 }),
    202,
  )
  const jobs = [search.jobId, rehearsal.jobId]
  const returned = sheets.items.find(({ state }) => state === 'returned')!
  const shared = await sharedAnswer(developer, returned.id)
  const owner = await Client.signedIn(url, 'owner')
  const links = [await invitation(owner), await newPassword(owner), '/address/a-link-that-no-longer-holds']
  return {
    paths: [
      ...[`/problems/${dense}`, `/embeddings/${search.id}`],
      ...[`/run-sheets/${approved.id}`, `/returns/${rehearsal.returnId}`, shared, ...links],
    ],
    async stop() {
      for (const id of jobs) await developer.call('DELETE', `/api/jobs/${id}`)
      for (const id of jobs) await developer.finished(id)
    },
  }
}

/** An answer handed out behind a link, which only who holds it can find. */
async function sharedAnswer(developer: Client, runSheetId: string): Promise<string> {
  const { returns } = await created<{ returns: { id: string; source: string }[] }>(
    developer.get(`/api/run-sheets/${runSheetId}`),
    200,
  )
  const samples = returns.find(({ source }) => source === 'upload')!
  const body = { remark: 'For the radio office: channel by channel.' }
  return (await created<{ url: string }>(developer.post(`/api/returns/${samples.id}/answer-sheet`, body))).url
}

/** The page of an invitation, which only who gets its link can find. */
async function invitation(owner: Client): Promise<string> {
  const body = { email: 'newcomer@brackwater.example', roles: ['reader'] }
  return new URL((await created<{ link: string }>(owner.post('/api/invitations', body))).link).pathname
}

/** The page for a new password of the reader, which only who gets its link can find. */
async function newPassword(owner: Client): Promise<string> {
  const { items } = await created<{ items: { id: string; roles: string[] }[] }>(owner.get('/api/people'), 200)
  const reader = items.find(({ roles }) => roles.join() === 'reader')!
  const { link } = await created<{ link: string }>(owner.post(`/api/people/${reader.id}/reset-link`))
  return new URL(link).pathname
}

async function created<T>(answer: Promise<{ status: number; body: T; text: string }>, status = 201): Promise<T> {
  const { status: got, body, text } = await answer
  if (got !== status) throw new Error(`a state could not be prepared: ${got} instead of ${status}: ${text}`)
  return body
}

function randomLines(variables: number, density: number, seed: number): string {
  const random = createRandom(seed)
  const lines: string[] = []
  for (let i = 0; i < variables; i++)
    for (let j = i; j < variables; j++)
      if (i === j || random.float() < density) lines.push(`v${i} v${j} ${random.below(9) - 4.5}`)
  return lines.join('\n')
}

const problem = async (developer: Client, name: string, text: string, fields: Record<string, string> = {}) =>
  (await created(developer.upload<{ id: string }>('/api/problems', text, 'lines.txt', { name, ...fields }))).id

async function prepareProblems(developer: Client): Promise<void> {
  await problem(developer, 'Maximised spins', 'a a 1\na b -2\nb c 0.5\n', { form: 'ising', sense: 'max' })
  await problem(developer, 'A line left out', 'a b 1\nb c\nc d 2\n', { skipRejected: 'true' })
}

async function prepareEmbeddings(developer: Client, steward: Client) {
  const machine = await created(
    steward.post<{ id: string }>('/api/machines', { name: 'Rowan', family: { kind: 'king', width: 12, height: 12 } }),
  )
  const small = await problem(developer, 'A ring of six', 'a b 1\nb c 1\nc d -1\nd e 1\ne f 1\nf a -1\n')
  const embedding = await search(developer, { problemId: small, machineId: machine.id })
  const { chains } = (await developer.get<{ chains: Record<string, number[]> }>(`/api/embeddings/${embedding}`)).body
  await created(developer.post('/api/embeddings/import', { problemId: small, machineId: machine.id, chains }))
  const dense = await problem(developer, 'Forty, tightly knit', randomLines(40, 0.18, 1))
  const hard = { problemId: dense, machineId: machine.id, method: 'search', tries: 1 }
  await search(developer, { ...hard, timeLimitSeconds: 0.3 })
  const stopped = await created(
    developer.post<{ jobId: string }>('/api/embeddings', { ...hard, timeLimitSeconds: 60 }),
    202,
  )
  await developer.call('DELETE', `/api/jobs/${stopped.jobId}`)
  await developer.finished(stopped.jobId)
  return { small, machine: machine.id, embedding }
}

async function search(developer: Client, settings: Record<string, unknown>): Promise<string> {
  const { id, jobId } = await created(developer.post<{ id: string; jobId: string }>('/api/embeddings', settings), 202)
  await developer.finished(jobId)
  return id
}

async function runSheet(developer: Client, embeddingId: string, name: string, steps: [Client, string, string][]) {
  const { id } = await created(developer.post<{ id: string }>('/api/run-sheets', { embeddingId, name, reads: 100 }))
  for (const [person, step, remark] of steps)
    await created(person.post(`/api/run-sheets/${id}/${step}`, { remark }), 200)
  return id
}

async function prepareRunSheets(developer: Client, reviewer: Client, embedding: string): Promise<void> {
  const submit: [Client, string, string] = [developer, 'submit', 'For the review.']
  const draft = await runSheet(developer, embedding, 'A draft', [])
  await runSheet(developer, embedding, 'Sent back', [submit, [reviewer, 'send-back', 'More reads, please.']])
  const approve: [Client, string, string] = [reviewer, 'approve', 'Go ahead.']
  await runSheet(developer, embedding, 'Approved', [submit, approve])
  await runSheet(developer, embedding, 'Issued', [submit, approve, [developer, 'issue', '']])
  const rehearse = (sweeps: number) =>
    created(developer.post<{ jobId: string }>(`/api/run-sheets/${draft}/rehearsals`, { reads: 200, sweeps }), 202)
  await developer.finished((await rehearse(50)).jobId)
  const stopped = await rehearse(1_000_000)
  await until(async () => {
    await developer.call('DELETE', `/api/jobs/${stopped.jobId}`)
    const { body } = await developer.get<{ status: string }>(`/api/jobs/${stopped.jobId}`)
    return body.status === 'cancelled'
  })
}

/** A passkey, reviews in other hands, and a remark that names somebody. */
async function preparePeople(url: string, developer: Client, reviewer: Client): Promise<void> {
  const { origin, hostname } = new URL(url)
  const asked = developer.post<PasskeyChallenge>('/api/account/passkeys/challenge', { current: DEMO_PASSWORD })
  const made = authenticator({ origin, hostname }).make(await created(asked, 200), 'Lock of the laptop')
  await created(developer.post('/api/account/passkeys', made))
  const { items } = await created<{ items: { id: string; roles: string[] }[] }>(developer.get('/api/people'), 200)
  const steward = items.find(({ roles }) => roles.join() === 'steward')!
  const dayFromNow = (days: number) => new Date(Date.now() + days * 86_400_000).toISOString().slice(0, 10)
  const absence = { byId: steward.id, startsOn: dayFromNow(0), endsOn: dayFromNow(20) }
  await created(reviewer.post('/api/stand-ins', absence))
  const sheets = await created<{ items: { id: string; state: string }[] }>(developer.get('/api/run-sheets'), 200)
  const draft = sheets.items.find(({ state }) => state === 'draft')!
  const remark = `Is the qubit back, @[${steward.id}]?`
  await created(developer.post(`/api/run-sheets/${draft.id}/remarks`, { remark }))
}

/** A run sheet that its bridge cannot be sent, and one that the built-in bridge rehearsed. */
async function prepareBridges(
  developer: Client,
  reviewer: Client,
  steward: Client,
  machineId: string,
  embedding: string,
): Promise<void> {
  const issued = async (name: string, bridge: object, state: string): Promise<void> => {
    await created(steward.call('PUT', `/api/machines/${machineId}/bridge`, bridge), 200)
    const id = await runSheet(developer, embedding, name, [
      [developer, 'submit', 'For the bridge.'],
      [reviewer, 'approve', ''],
    ])
    await created(developer.post(`/api/run-sheets/${id}/issue`, { byBridge: true }), 200)
    await until(async () => {
      const { body } = await developer.get<{ call: { state: string } }>(`/api/run-sheets/${id}`)
      return body.call.state === state
    })
  }
  await issued('By the built-in bridge', { kind: 'rehearsal' }, 'returned')
  // No call leaves this machine: the address is not public.
  await issued('Not taken', { kind: 'own', url: 'https://127.0.0.1/runs' }, 'given up')
  await created(steward.post(`/api/machines/${machineId}/bridge/secret`))
  await created(steward.post(`/api/machines/${machineId}/bridge/test`), 200)
}

/** A new calibration takes a qubit from an embedding that a run sheet builds on. */
async function prepareBroken(developer: Client, steward: Client, problemId: string, machineId: string): Promise<void> {
  const embedding = await search(developer, { problemId, machineId, seed: 2 })
  await runSheet(developer, embedding, 'On a lost qubit', [])
  const { chains } = (await developer.get<{ chains: Record<string, number[]> }>(`/api/embeddings/${embedding}`)).body
  const qubits = [Object.values(chains)[0]![0]!]
  await created(
    steward.post(`/api/machines/${machineId}/calibrations`, { defects: { qubits }, remark: 'A qubit went.' }),
  )
}
