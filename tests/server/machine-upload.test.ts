import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { UploadedGraph, UploadedMachine } from '../../shared/schemas/machine-uploads'
import { unpackArrays } from '../../shared/packed-arrays'
import { Client } from '../support/client'
import { seededFolder } from '../support/folders'
import type { RunningServer } from '../support/server'
import { startServer } from '../support/server'

interface Refusal {
  data: { code: string; message: string; issues?: { path?: string; line?: number; message: string }[] }
}
interface Graph {
  nodes: number[]
  edges: [number, number][]
  positions: [number, number][]
}

let server: RunningServer
let steward: Client
let developer: Client
const dataFolder = seededFolder()
beforeAll(async () => {
  server = await startServer({ DEMO: 'true', DATA_DIR: dataFolder })
  steward = await Client.signedIn(server.url, 'steward')
  developer = await Client.signedIn(server.url, 'developer')
})
afterAll(() => server.stop())

/** A ring of 12 qubits numbered in tens, each joined to the next two. */
const RING = Array.from({ length: 12 }, (_, k) => [10 * k, 10 * ((k + 1) % 12), 10 * ((k + 2) % 12)] as const)
const RING_LIST = RING.flatMap(([a, b, c]) => [`${a},${b}`, `${a},${c}`]).join('\n')
const machine = (given: Record<string, unknown>): Record<string, string> => ({ machine: JSON.stringify(given) })
const written = (pairs: readonly (readonly [number, number])[]): string[] =>
  pairs.map(([a, b]) => `${Math.min(a, b)}-${Math.max(a, b)}`).sort()

async function graphOf(id: string): Promise<Graph> {
  return (await steward.get<Graph>(`/api/machines/${id}/graph`)).body
}

describe('an uploaded graph', () => {
  let id: string

  it('is only read in a dry run', async () => {
    const { status, body } = await steward.upload<UploadedGraph>('/api/machines', RING_LIST, 'ring.csv', {
      dryRun: 'true',
    })
    expect(status).toBe(200)
    expect(body).toMatchObject({
      graph: 'graph of 12 qubits',
      format: 'edge-list',
      formatSource: 'detected',
      positions: 'drawn',
      qubits: 12,
      couplers: 24,
      leastDegree: 4,
      mostDegree: 4,
      parts: 1,
      isolatedQubits: 0,
      lowestNumber: 0,
      highestNumber: 110,
    })
    const { body: list } = await steward.get<{ items: { family: string }[] }>('/api/machines')
    expect(list.items.some(({ family }) => family.startsWith('graph of'))).toBe(false)
  })

  it('becomes a machine with its sheet, without the parts that are missing', async () => {
    const { status, body } = await steward.upload<UploadedMachine>('/api/machines', RING_LIST, 'ring.csv', {
      ...machine({
        name: 'Willow',
        defects: { qubits: [30], couplers: [[0, 10]] },
        ranges: { h: [-2, 2], J: [-1, 1] },
      }),
    })
    expect(status).toBe(201)
    expect(body).toMatchObject({ calibration: 1, qubits: 11, couplers: 19, positions: 'drawn' })
    id = body.id
    const { body: view } = await steward.get<Record<string, unknown>>(`/api/machines/${id}`)
    expect(view).toMatchObject({
      name: 'Willow',
      family: 'graph of 12 qubits',
      familySizes: { kind: 'custom', file: 'ring.csv', qubits: 12, couplers: 24, positions: 'drawn' },
      qubitsMade: 12,
      couplersMade: 24,
      maxDegree: 4,
      sheet: { ranges: { h: [-2, 2] } },
    })
  })

  it('is given out as it came in, less what is missing', async () => {
    const graph = await graphOf(id)
    expect(graph.nodes).toEqual([0, 10, 20, 40, 50, 60, 70, 80, 90, 100, 110])
    const expected = RING.flatMap(([a, b, c]): [number, number][] => [
      [a, b],
      [a, c],
    ]).filter((pair) => !pair.includes(30) && written([pair])[0] !== '0-10')
    expect(written(graph.edges)).toEqual(written(expected))
    expect(new Set(graph.positions.map(String)).size).toBe(11)
    const { bytes } = await steward.download(`/api/machines/${id}/lattice`)
    const { ids, ends, missingCouplers } = unpackArrays(bytes).arrays
    expect([ids!.length, ends!.length / 2, missingCouplers!.length / 2]).toEqual([12, 19, 1])
  })

  it('can be calibrated, embedded onto, and survives a restart', async () => {
    const recalibrated = await steward.post(`/api/machines/${id}/calibrations`, {
      defects: { qubits: [30, 40], couplers: [] },
      remark: 'lost 40',
    })
    expect(recalibrated.status).toBe(201)
    const wrong = await steward.post<Refusal>(`/api/machines/${id}/calibrations`, {
      defects: { qubits: [5], couplers: [[0, 50]] },
    })
    expect(wrong.status).toBe(422)
    expect(wrong.body.data.issues!.map(({ message }) => message)).toEqual([
      'graph of 12 qubits has no qubit 5',
      'graph of 12 qubits has no coupler 0-50',
    ])
    await server.stop()
    server = await startServer({ DEMO: 'true', DATA_DIR: dataFolder })
    steward = await Client.signedIn(server.url, 'steward')
    developer = await Client.signedIn(server.url, 'developer')
    const uploaded = await developer.upload<{ id: string }>('/api/problems', 'a b 1\nb c 1\nc a 1\nc d -1\n', 'p.txt')
    const started = await developer.post<{ id: string; jobId: string }>('/api/embeddings', {
      problemId: uploaded.body.id,
      machineId: id,
    })
    expect(started.status).toBe(202)
    expect((await developer.finished(started.body.jobId)).status).toBe('done')
    const { body: embedding } = await developer.get<{
      status: string
      valid: boolean
      chains: Record<string, number[]>
    }>(`/api/embeddings/${started.body.id}`)
    expect(embedding).toMatchObject({ status: 'found', valid: true })
    const { nodes } = await graphOf(id)
    for (const qubit of Object.values(embedding.chains).flat()) expect(nodes).toContain(qubit)
  })

  it('takes the graph that a machine is given out as, at its positions', async () => {
    const { body: king } = await steward.post<{ id: string }>('/api/machines', {
      name: 'Board',
      family: { kind: 'king', width: 5, height: 4 },
    })
    const graph = await graphOf(king.id)
    const { body } = await steward.upload<UploadedMachine>('/api/machines', JSON.stringify(graph), 'board.json', {
      ...machine({ name: 'Board again' }),
    })
    expect(body).toMatchObject({ format: 'json', positions: 'given', qubits: 20, couplers: 4 * 20 - 3 * 9 + 2 })
    expect(await graphOf(body.id)).toEqual(graph)
    const { text } = await steward.get<unknown>(`/api/machines/${king.id}/graph?format=mtx`)
    const again = await steward.upload<UploadedGraph>('/api/machines', text, 'board.mtx', { dryRun: 'true' })
    expect(again.body).toMatchObject({ format: 'matrix-market', positions: 'drawn', qubits: 20, couplers: 55 })
  })
})

describe('what cannot be taken', () => {
  it('is refused with the lines that are wrong, and nothing is saved', async () => {
    const text = '0 1\n1 1\n1 0\n2 three\n'
    const { status, body } = await steward.upload<Refusal>(
      '/api/machines',
      text,
      'wrong.txt',
      machine({ name: 'Wrong' }),
    )
    expect(status).toBe(422)
    expect(body.data).toMatchObject({ code: 'machine.graph', issues: [{ line: 2 }, { line: 3 }, { line: 4 }] })
    expect(body.data.message).toContain('3 things are wrong; first line 2: qubit 1 is coupled to itself')
    const { body: list } = await steward.get<{ items: { name: string }[] }>('/api/machines')
    expect(list.items.map(({ name }) => name)).not.toContain('Wrong')
  })

  it('names the field of the sheet', async () => {
    const send = (fields: Record<string, string>) =>
      steward.upload<Refusal>('/api/machines', RING_LIST, 'ring.csv', fields)
    const named = async (fields: Record<string, string>): Promise<string | undefined> => {
      const { status, body } = await send(fields)
      expect(status).toBe(422)
      return body.data.issues?.[0]?.path
    }
    expect(await named(machine({ name: '' }))).toBe('machine.name')
    expect(await named({ machine: '{' })).toBe('machine')
    expect(await named(machine({ name: 'W', defects: { qubits: [7] } }))).toBe('defects.qubits.0')
    expect(await named({ ...machine({ name: 'W' }), format: 'xlsx' })).toBe('format')
    expect((await send({})).status).toBe(400)
    expect((await send(machine({ name: 'Willow' }))).body.data).toMatchObject({ code: 'machine.name' })
    const none = new FormData()
    none.append('machine', '{}')
    expect((await steward.post<Refusal>('/api/machines', none)).status).not.toBe(201)
  })

  it('is for stewards and owners', async () => {
    expect((await developer.upload('/api/machines', RING_LIST, 'ring.csv', { dryRun: 'true' })).status).toBe(403)
  })
})
