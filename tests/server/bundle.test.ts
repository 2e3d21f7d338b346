import { execFileSync } from 'node:child_process'
import { mkdirSync, rmSync, writeFileSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { unzipSync } from 'fflate'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor } from '../../server/app'
import { bundleOf } from '../../server/services/bundle'
import { startEmbedding } from '../../server/services/embeddings'
import { createAccount } from '../../server/services/people'
import { editProblem } from '../../server/services/problems'
import { handOver } from '../../server/services/review'
import { createRunSheet, runSheetRow } from '../../server/services/run-sheets'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { createRunSheetSchema } from '../../shared/schemas/run-sheets'
import { updateRunSheet } from '../../server/database/repositories/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { temporaryFolder } from '../support/server'

let test: TestApp
let reviewer: Actor
let problemId: string
let embeddingId: string
let sheetId: string

/** Ten variables, all interacting, so that chains are long; one has a name that wants quoting, one that of a property. */
function problemText(): string {
  const names = ['7', '__proto__', 'a"b', ...'tuvwxyz']
  const pairs = names.flatMap((a, i) =>
    names.slice(0, i).map((b, j) => [a, b, ((3 * i + 5 * j) % 7) - 3.25].join('\t')),
  )
  return ['# form: ising', ...names.map((a, i) => [a, a, i / 4 - 1].join('\t')), ...pairs].join('\n')
}

beforeAll(async () => {
  test = await startTestApp(1)
  reviewer = await test.app.db.transaction(async (tx) => {
    const { workspaceId } = test.actor
    const account = { email: 'reviewer@test.example', name: 'Reviewer', passwordHash: '-', workspaceId }
    return { workspaceId, userId: await createAccount(test.app, tx, { ...account, roles: ['reviewer'] }) }
  })
  problemId = await test.problem(problemText())
  const machineId = await test.machine({ kind: 'chimera', m: 4, t: 4 })
  const search = createEmbeddingSchema.parse({ problemId, machineId, seed: 1, tries: 2, timeLimitSeconds: 20 })
  const { id, jobId } = await startEmbedding(test.app, test.actor, search)
  await test.finished(jobId)
  embeddingId = id
  sheetId = await sheet({ gauges: 7, reads: 100, fieldSplit: 'external coupling' })
})
afterAll(() => test.close())

async function sheet(settings: Record<string, unknown>): Promise<string> {
  const input = createRunSheetSchema.parse({ embeddingId, name: 'Bundled, with\u00a0care', ...settings })
  return (await createRunSheet(test.app, test.actor, input)).id
}

const bundle = (id: string) => bundleOf(test.app, test.actor, id)

async function approve(id: string): Promise<void> {
  await handOver(test.app, test.actor, id, 'submit', '')
  await handOver(test.app, reviewer, id, 'approve', '')
}

const unpacked = (bytes: Uint8Array): Record<string, string> =>
  Object.fromEntries(
    Object.entries(unzipSync(bytes)).map(([name, data]) => [
      name.replace(/^RS-\d+\//, ''),
      new TextDecoder('utf-8', { fatal: true }).decode(data),
    ]),
  )

type Spins = Map<number, number>

/** Fields and couplings of each file of the problem, read by nothing of the product. */
function problemsIn(files: Record<string, string>): { h: Spins; J: [number, number, number][] }[] {
  const json = JSON.parse(files['problem.json']!) as { h: Record<string, number>; J: [number, number, number][] }
  const rows = (text: string, separator: string, shift: number) => {
    const lines = text.split('\n').filter((line) => /^[\d-]/.test(line))
    const entries = lines.map((line) => line.split(separator).map(Number) as [number, number, number])
    return {
      h: new Map(entries.filter(([a, b]) => a === b).map(([a, , value]) => [a - shift, value])),
      J: entries
        .filter(([a, b]) => a !== b)
        .map(([a, b, value]): [number, number, number] => [a - shift, b - shift, value]),
    }
  }
  const matrix = files['problem.mtx']!.split('\n').filter((line) => /^\d/.test(line))
  return [
    { h: new Map(Object.entries(json.h).map(([q, value]) => [Number(q), value])), J: json.J },
    rows(files['problem.csv']!, ',', 0),
    rows(matrix.slice(1).join('\n'), ' ', 1),
  ]
}

const energyOf = ({ h, J }: { h: Spins; J: [number, number, number][] }, s: Spins): number =>
  [...h].reduce((sum, [q, value]) => sum + value * s.get(q)!, 0) +
  J.reduce((sum, [a, b, value]) => sum + value * s.get(a)! * s.get(b)!, 0)

interface Logical {
  offset: number
  h: [string, number][]
  J: [string, string, number][]
}
const chainsIn = (files: Record<string, string>) =>
  JSON.parse(files['map-back.json']!) as { variable: string; qubits: number[] }[]

function statesOf(files: Record<string, string>): { logical: number; spins: Spins }[] {
  const { offset, h, J } = JSON.parse(files['logical.json']!) as Logical
  const chains = chainsIn(files)
  return Array.from({ length: 64 }, (_, bits) => {
    const up = new Map(h.map(([label], i) => [label, (bits * 37 + 11) & (1 << i) ? 1 : -1]))
    const logical =
      h.reduce((sum, [label, value]) => sum + value * up.get(label)!, offset) +
      J.reduce((sum, [a, b, value]) => sum + value * up.get(a)! * up.get(b)!, 0)
    return {
      logical,
      spins: new Map(chains.flatMap(({ variable, qubits }) => qubits.map((q) => [q, up.get(variable)!]))),
    }
  })
}

describe('the bundle of a run sheet', () => {
  it('is refused before approval, with what to do', async () => {
    await expect(bundle(sheetId)).rejects.toMatchObject({ kind: 'wrong state', message: /Submit it for review/ })
    await handOver(test.app, test.actor, sheetId, 'submit', '')
    await expect(bundle(sheetId)).rejects.toMatchObject({
      code: 'bundle.state',
      message: /once a reviewer has approved/,
    })
    await handOver(test.app, reviewer, sheetId, 'approve', '')
    expect((await bundle(sheetId)).fileName).toMatch(/^RS-\d+\.zip$/)
  })

  it('has the same bytes twice, once issued, after the problem got another name, and after a restart', async () => {
    const { bytes } = await bundle(sheetId)
    const same = async () => expect(Buffer.compare((await bundle(sheetId)).bytes, bytes)).toBe(0)
    await same()
    await handOver(test.app, test.actor, sheetId, 'issue', '')
    await editProblem(test.app, test.actor, problemId, { name: 'Renamed' })
    await same()
    test = await test.restarted(1)
    await same()
  })

  it('passes sha256sum -c', async () => {
    const folder = temporaryFolder()
    for (const [name, data] of Object.entries(unzipSync((await bundle(sheetId)).bytes))) {
      mkdirSync(dirname(join(folder, name)), { recursive: true })
      writeFileSync(join(folder, name), data)
    }
    const { number } = await runSheetRow(test.app, test.actor, sheetId)
    const inside = { cwd: join(folder, `RS-${number}`), encoding: 'utf8' as const }
    const answer = execFileSync('sha256sum', ['--strict', '-c', 'SHA256SUMS'], inside)
    expect(answer.trimEnd().split('\n')).toHaveLength(10)
    writeFileSync(join(inside.cwd, 'schedule.csv'), 'microseconds,s\n0,0\n21,1\n')
    expect(() => execFileSync('sha256sum', ['-c', 'SHA256SUMS'], { ...inside, stdio: 'pipe' })).toThrow()
    rmSync(folder, { recursive: true })
  })

  it('keeps the energy identity in each of its files', async () => {
    const files = unpacked((await bundle(sheetId)).bytes)
    const { scale, offset } = JSON.parse(files['problem.json']!) as { scale: number; offset: number }
    for (const problem of problemsIn(files))
      for (const { logical, spins } of statesOf(files))
        expect(energyOf(problem, spins) + offset).toBeCloseTo(scale * logical, 9)
  })

  it('has gauges that change no energy once they are undone, one sign a chain', async () => {
    const files = unpacked((await bundle(sheetId)).bytes)
    const [problem] = problemsIn(files)
    const qubits = [...problem!.h.keys()].sort((a, b) => a - b)
    const lines = files['gauges.csv']!.trimEnd().split('\n').slice(1)
    expect(lines.map((line) => line.split(',').slice(0, 2).join())).toEqual(
      [15, 15, 14, 14, 14, 14, 14].map((reads, g) => `${g},${reads}`),
    )
    expect(new Set(lines.map((line) => line.split(',')[2])).size).toBe(7)
    for (const line of lines) {
      const signs = new Map([...line.split(',')[2]!].map((sign, k) => [qubits[k]!, sign === '+' ? 1 : -1]))
      for (const chain of chainsIn(files)) expect(new Set(chain.qubits.map((q) => signs.get(q))).size).toBe(1)
      const turned = {
        h: new Map([...problem!.h].map(([q, value]) => [q, signs.get(q)! * value])),
        J: problem!.J.map(([a, b, value]): [number, number, number] => [a, b, signs.get(a)! * signs.get(b)! * value]),
      }
      for (const { spins } of statesOf(files).slice(0, 8)) {
        const read = new Map([...spins].map(([q, s]) => [q, signs.get(q)! * s]))
        expect(energyOf(turned, read)).toBeCloseTo(energyOf(problem!, spins), 9)
      }
    }
  })

  it('says in its read-me two energies that agree, and leaves a single gauge as it stands', async () => {
    const id = await sheet({
      gauges: 1,
      schedule: [
        { microseconds: 0, s: 0 },
        { microseconds: 20, s: 1 },
      ],
    })
    await approve(id)
    const files = unpacked((await bundle(id)).bytes)
    const [, scaled] = /scale \* E_logical {3}= (\S+)/.exec(files['README.txt']!)!
    const [, physical] = /E_physical \+ offset = (\S+)/.exec(files['README.txt']!)!
    expect(Number(physical)).toBeCloseTo(Number(scaled), 8)
    expect(files['gauges.csv']).toMatch(/^gauge,reads,signs\n0,1000,\++\n$/)
    expect(files['schedule.csv']).toBe('microseconds,s\n0,0\n20,1\n')
    expect(files['map-back.csv']!.split('\n').length).toBe(Object.keys(JSON.parse(files['problem.json']!).h).length + 2)
  })

  it('is refused where something else would be programmed than was approved', async () => {
    const { fingerprint } = await runSheetRow(test.app, test.actor, sheetId)
    await updateRunSheet(test.app.db, sheetId, ['issued'], { fingerprint: 'f'.repeat(64) })
    await expect(bundle(sheetId)).rejects.toMatchObject({ code: 'bundle.fingerprint' })
    await updateRunSheet(test.app.db, sheetId, ['issued'], { fingerprint })
  })
})
