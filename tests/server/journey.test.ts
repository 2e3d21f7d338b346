import Graph from 'graphology'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import { startServer } from '../support/server'

/*
 * The whole job through the routes, each figure recomputed here from the definitions (docs/formulas.md), sharing no code
 * with the product.
 */

const QUBO = 'a a -3\na b 2.5\nb b 1\nb c -4\nc c 0.25\nc d 1.5\nd d -1\nd a 2\n'
const LABELS = ['a', 'b', 'c', 'd']
const TERMS: [string, string, number][] = QUBO.trim()
  .split('\n')
  .map((line) => line.split(' '))
  .map(([i, j, v]) => [i!, j!, Number(v)])

const quboEnergy = (x: Record<string, number>): number => TERMS.reduce((sum, [i, j, v]) => sum + v * x[i]! * x[j]!, 0)
const allStates = LABELS.reduce<number[][]>(
  (rows) =>
    rows.flatMap((row) => [
      [...row, 0],
      [...row, 1],
    ]),
  [[]],
)
const named = (state: number[]): Record<string, number> =>
  Object.fromEntries(LABELS.map((label, i) => [label, state[i]!]))

interface MachineGraph {
  nodes: number[]
  edges: [number, number][]
  positions: [number, number][]
}
interface Programmed {
  h: Record<string, number>
  J: [number, number, number][]
  scale: number
  offset: number
}

let server: RunningServer
let developer: Client
let steward: Client
let problemId: string
let machineId: string
let embeddingId: string
let chains: Record<string, number[]>
let runSheetId: string
let programmed: Programmed

beforeAll(async () => {
  server = await startServer({ DEMO: 'true', DATA_DIR: seededFolder() })
  developer = await Client.signedIn(server.url, 'developer')
  steward = await Client.signedIn(server.url, 'steward')
})
afterAll(() => server.stop())

describe('a problem', () => {
  it('is only read in a dry run', async () => {
    const { status, body } = await developer.upload<{ id: null; variables: number; reading: { format: string } }>(
      '/api/problems',
      QUBO,
      'small.txt',
      {
        dryRun: 'true',
      },
    )
    expect(status).toBe(200)
    expect(body).toMatchObject({ id: null, variables: 4, interactions: 4, form: 'qubo', sense: 'min' })
    expect(body.reading.format).toBe('coefficients')
  })

  it('is saved with what was understood', async () => {
    const { status, body } = await developer.upload<{ id: string }>('/api/problems', QUBO, 'small.txt', {
      name: 'Small',
    })
    expect(status).toBe(201)
    problemId = body.id
  })

  it('has the energies of its definition in both forms, offset included', async () => {
    const expected = allStates.map((state) => quboEnergy(named(state)))
    const qubo = await developer.post<{ energies: number[] }>(`/api/problems/${problemId}/energy`, {
      form: 'qubo',
      states: allStates,
    })
    const spins = allStates.map((state) => state.map((x) => 2 * x - 1))
    const ising = await developer.post<{ energies: number[] }>(`/api/problems/${problemId}/energy`, {
      form: 'ising',
      states: spins,
    })
    expect(qubo.body.energies).toEqual(expected)
    expect(ising.body.energies).toEqual(expected)
  })

  it('comes back unchanged from either form’s file', async () => {
    for (const form of ['qubo', 'ising']) {
      const { text } = await developer.get(`/api/problems/${problemId}/coefficients?form=${form}&format=csv`)
      const { body } = await developer.upload<{ id: string; form: string }>('/api/problems', text, 'again.csv')
      expect(body.form).toBe(form)
      const { body: again } = await developer.post<{ energies: number[] }>(`/api/problems/${body.id}/energy`, {
        form: 'qubo',
        states: allStates,
      })
      expect(again.energies).toEqual(allStates.map((state) => quboEnergy(named(state))))
    }
  })

  it('reads a dense matrix as xᵀQx', async () => {
    const { body } = await developer.upload<{ id: string }>('/api/problems', '1,2,0\n-3,0,4\n0,1,-2\n', 'dense.csv', {
      format: 'dense-csv',
    })
    const { body: energy } = await developer.post<{ energies: number[] }>(`/api/problems/${body.id}/energy`, {
      form: 'qubo',
      states: [
        [1, 1, 0],
        [0, 1, 1],
        [1, 1, 1],
      ],
    })
    expect(energy.energies).toEqual([0, 3, 3])
  })

  it('keeps the sense of a maximisation', async () => {
    const { body } = await developer.upload<{ id: string; sense: string }>(
      '/api/problems',
      'a b 5\na a -1\n',
      'max.csv',
      { sense: 'max' },
    )
    expect(body.sense).toBe('max')
    const { body: energy } = await developer.post<{ energies: number[] }>(`/api/problems/${body.id}/energy`, {
      form: 'qubo',
      states: [[1, 1]],
    })
    expect(energy.energies).toEqual([4])
  })
})

describe('a machine', () => {
  it('has the published counts of its family', async () => {
    // Boothby et al., arXiv:2003.00133: P(16) trimmed has 5640 qubits and 40484 couplers.
    const { status, body } = await steward.post<{ id: string; qubits: number; couplers: number }>('/api/machines', {
      name: 'Test P16',
      family: { kind: 'pegasus', m: 16 },
    })
    expect(status).toBe(201)
    expect(body).toMatchObject({ qubits: 5640, couplers: 40484, calibration: 1 })
  })

  it('leaves out its defects', async () => {
    const whole = await steward.post<{ id: string }>('/api/machines', {
      name: 'Whole',
      family: { kind: 'chimera', m: 3, n: 3, t: 4 },
    })
    const graph = (await steward.get<MachineGraph>(`/api/machines/${whole.body.id}/graph`)).body
    const missing = graph.nodes[5]!
    const [a, b] = graph.edges.find((edge) => !edge.includes(missing))!
    const { body } = await steward.post<{ id: string; qubits: number; couplers: number }>('/api/machines', {
      name: 'With defects',
      family: { kind: 'chimera', m: 3, n: 3, t: 4 },
      defects: { qubits: [missing], couplers: [[a, b]] },
      ranges: { h: [-2, 2], J: [-1, 1], couplingSum: [-6, 6] },
      controlError: { h: 0.02, J: 0.01 },
      timing: { programmingMicroseconds: 10000, readoutMicroseconds: 100, delayMicroseconds: 20 },
      temperatureMillikelvin: 14,
    })
    machineId = body.id
    const degree = graph.edges.filter((edge) => edge.includes(missing)).length
    expect(body.qubits).toBe(graph.nodes.length - 1)
    expect(body.couplers).toBe(graph.edges.length - degree - 1)
    const working = (await steward.get<MachineGraph>(`/api/machines/${machineId}/graph`)).body
    expect(working.nodes).not.toContain(missing)
    expect(working.positions).toHaveLength(working.nodes.length)
  })

  it('refuses defects that the family does not have', async () => {
    const { status, body } = await steward.post<{ data: { issues: { path: string }[] } }>('/api/machines', {
      name: 'Wrong',
      family: { kind: 'square', width: 3, height: 3 },
      defects: { qubits: [99], couplers: [[0, 8]] },
    })
    expect(status).toBe(422)
    expect(body.data.issues.map(({ path }) => path)).toEqual(['defects.qubits.0', 'defects.couplers.0'])
  })
})

describe('an embedding', () => {
  it('is found, and contracting its chains gives the problem', async () => {
    const started = await developer.post<{ id: string; jobId: string }>('/api/embeddings', {
      problemId,
      machineId,
      seed: 3,
      tries: 2,
    })
    expect(started.status).toBe(202)
    embeddingId = started.body.id
    expect((await developer.finished(started.body.jobId)).status).toBe('done')
    const { body } = await developer.get<{
      status: string
      valid: boolean
      chains: Record<string, number[]>
      stats: { qubitsUsed: number }
    }>(`/api/embeddings/${embeddingId}`)
    expect(body).toMatchObject({ status: 'found', valid: true })
    chains = body.chains
    const machine = (await developer.get<MachineGraph>(`/api/machines/${machineId}/graph`)).body
    expectMinor(machine, chains)
    expect(body.stats.qubitsUsed).toBe(Object.values(chains).flat().length)
  })

  it('is the same again from the same seed', async () => {
    const { body } = await developer.post<{ id: string; jobId: string }>('/api/embeddings', {
      problemId,
      machineId,
      seed: 3,
      tries: 2,
    })
    await developer.finished(body.jobId)
    const again = await developer.get<{ chains: Record<string, number[]> }>(`/api/embeddings/${body.id}`)
    expect(again.body.chains).toEqual(chains)
  })

  it('can be imported, and is refused with every broken rule named', async () => {
    const good = await developer.post('/api/embeddings/import', { problemId, machineId, chains })
    expect(good.status).toBe(201)
    const shared = { ...chains, a: chains.b!, d: [] }
    const bad = await developer.post<{ data: { issues: { message: string }[] } }>('/api/embeddings/import', {
      problemId,
      machineId,
      chains: shared,
    })
    expect(bad.status).toBe(422)
    const words = bad.body.data.issues.map(({ message }) => message).join('\n')
    expect(words).toMatch(/a/)
    expect(bad.body.data.issues.length).toBeGreaterThan(1)
  })

  it('can be chosen, which takes the mark from the one before', async () => {
    type View = { id: string; chosen: boolean }
    const list = async () => (await developer.get<{ embeddings: View[] }>(`/api/problems/${problemId}`)).body.embeddings
    const other = (await list()).find(({ id }) => id !== embeddingId)!.id
    expect((await developer.call('PATCH', `/api/embeddings/${other}`, { chosen: true })).status).toBe(200)
    const { status, body } = await developer.call<View>('PATCH', `/api/embeddings/${embeddingId}`, { chosen: true })
    expect(status).toBe(200)
    expect(body).toMatchObject({ id: embeddingId, chosen: true })
    expect((await list()).filter(({ chosen }) => chosen).map(({ id }) => id)).toEqual([embeddingId])
    expect((await steward.call('PATCH', `/api/embeddings/${other}`, { chosen: true })).status).toBe(403)
    expect((await developer.call('PATCH', `/api/embeddings/${other}`, {})).status).toBe(422)
  })

  it.each([
    ['a method beside an embedding to begin from', { method: 'lines', start: { work: 'repair' } }, 'method', /leave/],
    ['an unknown method', { method: 'magic' }, 'method', /./],
    ['a target below 1', { target: { longestChain: 0 } }, 'target.longestChain', /./],
    ['a target of another name', { target: { chain: 3 } }, 'target', /chain/],
    ['an unknown work', { start: { work: 'improve' } }, 'start.work', /./],
    ['an unknown variable to keep', { start: { work: 'shorten', frozen: ['q'] } }, 'start.frozen.0', /no variable q/],
  ])('asked for with %s is refused with the field', async (_what, fields, path, message) => {
    const start = 'start' in fields ? { start: { embeddingId, ...fields.start } } : {}
    const { status, body } = await developer.post<{ data: { issues: { path: string; message: string }[] } }>(
      '/api/embeddings',
      { problemId, machineId, ...fields, ...start },
    )
    expect(status).toBe(422)
    expect(body.data.issues[0]).toMatchObject({ path, message: expect.stringMatching(message) })
  })

  it('of a problem larger than the machine is refused with by how much', async () => {
    const tiny = await steward.post<{ id: string }>('/api/machines', {
      name: 'Tiny',
      family: { kind: 'square', width: 1, height: 3 },
    })
    const { status, body } = await developer.post<{ data: { code: string; message: string } }>('/api/embeddings', {
      problemId,
      machineId: tiny.body.id,
    })
    expect(status).toBe(422)
    expect(body.data.code).toBe('embedding.infeasible')
    expect(body.data.message).toMatch(/1 /)
  })
})

describe('a new calibration', () => {
  it('names the embeddings that it breaks', async () => {
    const used = Object.values(chains).flat()[0]!
    const { defects } = (
      await steward.get<{ sheet: { defects: { qubits: number[]; couplers: [number, number][] } } }>(
        `/api/machines/${machineId}`,
      )
    ).body.sheet
    type Saved = { calibration: number; invalidated: { embeddings: { id: string }[] } }
    const { status, body } = await steward.post<Saved>(`/api/machines/${machineId}/calibrations`, {
      defects: { ...defects, qubits: [...defects.qubits, used] },
      remark: 'a qubit went',
    })
    expect(status).toBe(201)
    expect(body.calibration).toBe(2)
    expect(body.invalidated.embeddings.map(({ id }) => id)).toContain(embeddingId)
    const { body: embedding } = await developer.get<{ holdsAtCurrentCalibration: boolean }>(
      `/api/embeddings/${embeddingId}`,
    )
    expect(embedding.holdsAtCurrentCalibration).toBe(false)
    const back = await steward.post<Saved>(`/api/machines/${machineId}/calibrations`, {
      defects,
      remark: 'it came back',
    })
    expect(back.body.invalidated.embeddings).toEqual([])
    const { body: machine } = await steward.get<{ calibrations: { number: number; broke: unknown[] }[] }>(
      `/api/machines/${machineId}`,
    )
    expect(machine.calibrations.map(({ number, broke }) => [number, broke.length > 0])).toEqual([
      [3, false],
      [2, true],
      [1, false],
    ])
  })
})

/** Contracts each chain in a copy of the machine, edge by edge, and looks for every interaction. */
function expectMinor(machine: MachineGraph, embedded: Record<string, number[]>): void {
  const graph = new Graph({ type: 'undirected' })
  for (const node of machine.nodes) graph.addNode(node)
  for (const [a, b] of machine.edges) graph.addEdge(a, b)
  const used = Object.values(embedded).flat()
  expect(new Set(used).size).toBe(used.length)
  for (const [label, chain] of Object.entries(embedded)) {
    const kept = String(chain[0])
    const rest = new Set(chain.slice(1).map(String))
    while (rest.size > 0) {
      const next = graph.neighbors(kept).find((neighbour) => rest.has(neighbour))
      expect(next, `the chain of ${label} is connected`).toBeDefined()
      for (const neighbour of graph.neighbors(next)) if (neighbour !== kept) graph.mergeEdge(kept, neighbour)
      graph.dropNode(next)
      rest.delete(next!)
    }
  }
  for (const [i, j] of TERMS)
    if (i !== j) expect(graph.hasEdge(embedded[i]![0], embedded[j]![0]), `${i}-${j}`).toBe(true)
}

describe('a run sheet', () => {
  it.each(['fixed', 'rms', 'choi', 'cut'])(
    'programmes by the rule %s so that scale·E_logical = E_physical + offset',
    async (rule) => {
      const created = await developer.post<{ id: string }>('/api/run-sheets', {
        embeddingId,
        name: 'Run',
        strength: { rule },
        reads: 500,
        annealMicroseconds: 20,
      })
      expect(created.status).toBe(201)
      runSheetId = created.body.id
      programmed = (await developer.get<Programmed>(`/api/run-sheets/${runSheetId}/programmed`)).body
      for (const state of allStates) {
        const spin: Record<string, number> = {}
        LABELS.forEach((label, i) => chains[label]!.forEach((qubit) => (spin[qubit] = 2 * state[i]! - 1)))
        const fields = Object.entries(programmed.h).reduce((sum, [qubit, h]) => sum + h * spin[qubit]!, 0)
        const physical = programmed.J.reduce((sum, [a, b, J]) => sum + J * spin[a]! * spin[b]!, fields)
        expect(physical + programmed.offset).toBeCloseTo(programmed.scale * quboEnergy(named(state)), 10)
      }
      const values = programmed.J.map(([, , J]) => J)
      expect(Math.max(...values.map(Math.abs))).toBeLessThanOrEqual(1)
      expect(Math.max(...Object.values(programmed.h).map(Math.abs))).toBeLessThanOrEqual(2)
    },
  )

  it('goes from hand to hand, and the settings stand still from submission on', async () => {
    const reviewer = await Client.signedIn(server.url, 'reviewer')
    expect((await reviewer.post(`/api/run-sheets/${runSheetId}/approve`, {})).status).toBe(409)
    expect((await developer.post(`/api/run-sheets/${runSheetId}/submit`, {})).status).toBe(200)
    expect((await developer.call('PATCH', `/api/run-sheets/${runSheetId}`, { reads: 2 })).status).toBe(409)
    expect((await developer.post(`/api/run-sheets/${runSheetId}/approve`, {})).status).toBe(403)
    expect((await reviewer.post(`/api/run-sheets/${runSheetId}/send-back`, {})).status).toBe(422)
    expect((await reviewer.post(`/api/run-sheets/${runSheetId}/approve`, { remark: 'fine' })).status).toBe(200)
    expect((await developer.post(`/api/run-sheets/${runSheetId}/issue`)).status).toBe(200)
  })
})

interface ReturnBody {
  reads: number
  breaks: { chains: { label: string; count: number }[]; readsWithBreak: { count: number }; perRead: number[] }
  energies: { best: number; bestCount: number }
  best: { assignment: Record<string, number> }
}

describe('samples', () => {
  it('of a rehearsal find the optimum of a small problem, and are the same again', async () => {
    const runs = []
    for (let run = 0; run < 2; run++) {
      const { status, body } = await developer.post<{ returnId: string; jobId: string }>(
        `/api/run-sheets/${runSheetId}/rehearsals`,
        { reads: 300, sweeps: 200, seed: 5 },
      )
      expect(status).toBe(202)
      expect((await developer.finished(body.jobId)).status).toBe('done')
      runs.push((await developer.get(`/api/returns/${body.returnId}/samples`)).text)
      const view = (await developer.get<ReturnBody>(`/api/returns/${body.returnId}`)).body
      const optimum = Math.min(...allStates.map((state) => quboEnergy(named(state))))
      expect(view.energies.best).toBe(optimum)
      expect(quboEnergy(view.best.assignment)).toBe(optimum)
    }
    expect(runs[1]).toBe(runs[0])
  })

  it('uploaded as CSV are counted as a person would count them', async () => {
    const qubits = Object.keys(programmed.h)
    const long = Object.entries(chains).find(([, chain]) => chain.length > 1)
    const flat = qubits.map(() => 1)
    const broken = qubits.map((qubit) => (long && Number(qubit) === long[1][0] ? -1 : 1))
    const csv = [[...qubits, 'count'].join(','), [...flat, 7].join(','), [...broken, 3].join(',')].join('\n')
    const { status, body } = await developer.upload<{ id: string; reads: number }>(
      `/api/run-sheets/${runSheetId}/returns`,
      csv,
      'samples.csv',
    )
    expect(status).toBe(201)
    expect(body.reads).toBe(10)
    const view = (await developer.get<ReturnBody>(`/api/returns/${body.id}`)).body
    expect(view.breaks.readsWithBreak.count).toBe(long ? 3 : 0)
    for (const { label, count } of view.breaks.chains) expect(count).toBe(long && label === long[0] ? 3 : 0)
    expect((await developer.get<{ state: string }>(`/api/run-sheets/${runSheetId}`)).body.state).toBe('returned')
  })

  it.each([
    [
      'a column of another qubit',
      (qubits: string[]) => `${[...qubits.slice(1), '999999'].join(',')}\n${qubits.map(() => 1).join(',')}\n`,
      /999999/,
    ],
    [
      'a missing column',
      (qubits: string[]) =>
        `${qubits.slice(1).join(',')}\n${qubits
          .slice(1)
          .map(() => 1)
          .join(',')}\n`,
      /missing|lacks/i,
    ],
    ['a value that is no spin', (qubits: string[]) => `${qubits.join(',')}\n${qubits.map(() => 2).join(',')}\n`, /2/],
    ['a short row', (qubits: string[]) => `${qubits.join(',')}\n1,1\n`, /2/],
    ['nothing', () => '', /./],
  ])('with %s are refused with the reason', async (_what, csvOf, reason) => {
    const { status, body } = await developer.upload<{ data: { message: string } }>(
      `/api/run-sheets/${runSheetId}/returns`,
      csvOf(Object.keys(programmed.h)),
      'bad.csv',
    )
    expect(status).toBe(422)
    expect(body.data.message).toMatch(reason)
  })
})

describe('hostile input', () => {
  it.each([
    ['NaN', 'a b NaN\nb c 1\n', 1],
    ['infinity', 'a b 1\nb c Infinity\n', 2],
    ['too few columns', 'a b 1\nb\n', 2],
    ['a word for a number', 'a b 1\nb c 2\nc d x\n', 3],
  ])('in a file (%s) is refused with its line', async (_what, text, line) => {
    const { status, body } = await developer.upload<{ data: { issues: { line: number; message: string }[] } }>(
      '/api/problems',
      text,
      'bad.txt',
    )
    expect(status).toBe(422)
    expect(body.data.issues.some((issue) => issue.line === line && issue.message.length > 5)).toBe(true)
  })

  it.each([
    ['an empty file', ''],
    ['only comments', '# nothing\n'],
    ['clashing labels', '1 2 3\n01 2 4\n'],
  ])('such as %s gives no problem', async (_what, text) => {
    const before = (await developer.get<{ items: unknown[] }>('/api/problems?limit=200')).body.items.length
    expect((await developer.upload('/api/problems', text, 'bad.txt')).status).toBe(422)
    expect((await developer.get<{ items: unknown[] }>('/api/problems?limit=200')).body.items).toHaveLength(before)
  })

  it('with text that cannot be stored is refused, or kept without it', async () => {
    expect((await developer.call('PATCH', `/api/problems/${problemId}`, { note: 'a\u0000b' })).status).toBe(422)
    expect((await developer.call('PATCH', `/api/problems/${problemId}`, { note: '\ud83d' })).status).toBe(422)
    const cut = `a b 1\n${'x'.repeat(199)}😀 tail\n`
    expect((await developer.upload('/api/problems', cut, 'cut.txt', { skipRejected: 'true' })).status).toBe(201)
  })

  it('in an address finds nothing, and fails nothing', async () => {
    for (const kind of ['problems', 'machines', 'embeddings', 'run-sheets', 'returns', 'jobs'])
      expect((await developer.get(`/api/${kind}/%00`)).status).toBe(404)
    expect((await developer.get(`/api/machines/${machineId}/graph?calibration=2147483648`)).status).toBe(422)
  })

  it('that is too large is refused before it is taken in', async () => {
    const { status } = await developer.upload('/api/problems', new Uint8Array(66 * 2 ** 20), 'large.csv')
    expect(status).toBe(413)
  })

  it('that is not text, not a form or not JSON is unreadable', async () => {
    expect((await developer.upload('/api/problems', Uint8Array.of(0xff, 0xfe, 0x00, 0xc0), 'bytes.bin')).status).toBe(
      400,
    )
    expect((await developer.post('/api/problems', { name: 'no form' })).status).toBe(400)
    const response = await fetch(`${server.url}/api/session`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: '{',
    })
    expect(response.status).toBe(400)
  })
})

describe('roles', () => {
  it('are checked on the server', async () => {
    const reader = await Client.signedIn(server.url, 'reader')
    expect((await reader.get('/api/problems')).status).toBe(200)
    expect((await reader.upload('/api/problems', QUBO, 'small.txt')).status).toBe(403)
    expect(
      (await reader.post('/api/machines', { name: 'X', family: { kind: 'king', width: 2, height: 2 } })).status,
    ).toBe(403)
    expect(
      (await developer.post('/api/machines', { name: 'X', family: { kind: 'king', width: 2, height: 2 } })).status,
    ).toBe(403)
    expect((await reader.post('/api/embeddings', { problemId, machineId })).status).toBe(403)
  })

  it('lets those who may delete also undo, and nobody else', async () => {
    const reader = await Client.signedIn(server.url, 'reader')
    const { id } = (await developer.upload<{ id: string }>('/api/problems', QUBO, 'short-lived.txt')).body
    const path = `/api/problems/${id}`
    const { body } = await developer.call<{ restorableUntil: string }>('DELETE', path)
    expect(new Date(body.restorableUntil).getTime()).toBeGreaterThan(Date.now())
    expect((await developer.get(path)).status).toBe(404)
    for (const kind of ['problems', 'embeddings', 'run-sheets'])
      for (const client of [reader, steward])
        expect((await client.post(`/api/${kind}/${id}/restore`)).status, kind).toBe(403)
    expect((await developer.post(`/api/embeddings/${id}/restore`)).status).toBe(404)
    expect((await developer.post(`${path}/restore`)).status).toBe(200)
    expect((await developer.get(`${path}/coefficients?form=qubo`)).text).toContain('a')
    expect((await developer.post(`${path}/restore`)).status).toBe(404)
    expect((await reader.call('DELETE', `/api/embeddings/${embeddingId}`)).status).toBe(403)
    expect((await developer.call('DELETE', `/api/embeddings/${embeddingId}`)).status).toBe(409)
    await developer.call('DELETE', path)
  })

  it('are asked of everybody', async () => {
    const nobody = new Client(server.url)
    expect((await nobody.get('/api/problems')).status).toBe(401)
    expect(
      (await nobody.post('/api/session', { email: 'developer@brackwater.example', password: 'wrong' })).status,
    ).toBe(401)
    expect((await developer.get('/api/problems/unknown')).status).toBe(404)
  })
})
