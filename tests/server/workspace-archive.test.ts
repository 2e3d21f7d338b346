import { createHash } from 'node:crypto'
import { createWriteStream, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { pipeline } from 'node:stream/promises'
import { sql } from 'drizzle-orm'
import { unzipSync, zipSync } from 'fflate'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Actor, App } from '../../server/app'
import { acceptInvitation } from '../../server/services/accept-invitation'
import { grantTime } from '../../server/services/budget'
import { bundleOf } from '../../server/services/bundle'
import { seedDemo } from '../../server/services/demo/seed'
import { invite } from '../../server/services/invitations'
import { handOver } from '../../server/services/review'
import type { JobRow } from '../../server/database/repositories/jobs'
import { startRehearsal } from '../../server/services/rehearsals'
import { duplicateRunSheet } from '../../server/services/run-sheet-copies'
import { addRemark } from '../../server/services/run-sheet-remarks'
import { rehearseSchema } from '../../shared/schemas/run-sheets'
import { asStoredFile } from '../../server/services/stored-files'
import { exportWorkspace, workspaceView } from '../../server/services/workspace-export'
import { archivedMembers, startImport } from '../../server/services/workspace-import'
import { JOB_KINDS } from '../../server/jobs/kinds'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'
import { grantSchema } from '../../shared/schemas/budget'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'
import { plainPasswords } from '../support/people'
import { temporaryFolder } from '../support/server'
import { rowsOf, contentsOf } from '../support/workspace-contents'

async function exported(app: App, actor: Actor): Promise<string> {
  const folder = temporaryFolder()
  const { stream } = await exportWorkspace(app, actor, folder)
  const path = join(folder, 'workspace.zip')
  await pipeline(stream, createWriteStream(path))
  return path
}

async function imported(test: TestApp, bytes: Uint8Array) {
  await test.app.database.executeSql('delete from attempts')
  const jobId = await asStoredFile('workspace.zip', bytes, (file) => startImport(test.app, test.actor, file))
  return test.finished(jobId)
}

let from: TestApp
let to: TestApp
let owner: Actor
let archive: string

async function seededActor(app: App): Promise<Actor> {
  const [row] = await rowsOf(app, 'users', `email = 'owner@brackwater.example'`)
  const [member] = await rowsOf(app, 'memberships', `user_id = '${String(row!.id)}'`)
  return { userId: row!.id as string, workspaceId: member!.workspace_id as string }
}

beforeAll(async () => {
  from = await startTestApp(2)
  await from.app.db.execute(sql`delete from memberships`)
  await from.app.db.execute(sql`delete from users`)
  await from.app.db.execute(sql`delete from workspaces`)
  await seedDemo(from.app, plainPasswords)
  owner = await seededActor(from.app)
  await grantTime(from.app, owner, grantSchema.parse({ seconds: 2, remark: 'December' }))
  const [sheet] = await rowsOf(from.app, 'run_sheets', `state = 'in review'`)
  const [developer] = await rowsOf(from.app, 'users', `email = 'developer@brackwater.example'`)
  const copy = await duplicateRunSheet(from.app, owner, String(sheet!.id))
  await addRemark(from.app, owner, copy.id, `@[${String(developer!.id)}] shorter, please`)
  await startRehearsal(from.app, owner, copy.id, rehearseSchema.parse({ reads: 50, sweeps: 10 }))
  for (const { id } of await rowsOf(from.app, 'jobs')) await from.finished(id as string)
  archive = await exported(from.app, owner)
  to = await startTestApp(2)
}, 300_000)
afterAll(async () => {
  await from?.close()
  await to?.close()
})

const text = (bytes: Uint8Array): string => Buffer.from(bytes).toString()
const sum = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex')

interface Files {
  [path: string]: Uint8Array
}
interface ManifestText {
  workspace: { id: string; name: string }
  people: { id: string; name: string; email: string | null; roles: string[] }[]
  rows: Record<string, { rows: number; sha256: string }>
  blobs: Record<string, { bytes: number; sha256: string }>
}

/** The archive with something in it changed, and its manifest made to agree, as somebody would who forges it. */
function forged(change: (files: Files, manifest: ManifestText) => void): Uint8Array {
  const files: Files = unzipSync(readFileSync(archive))
  const manifest = JSON.parse(text(files['manifest.json']!)) as ManifestText
  change(files, manifest)
  for (const [path, bytes] of Object.entries(files)) {
    const [, kind, name] = /^(rows|blobs)\/([\w-]+)/.exec(path) ?? []
    if (kind === 'rows' && manifest.rows[name!]) manifest.rows[name!]!.sha256 = sum(bytes)
    if (kind === 'blobs' && manifest.blobs[name!]) manifest.blobs[name!]!.sha256 = sum(bytes)
  }
  return zipSync({ ...files, 'manifest.json': Buffer.from(JSON.stringify(manifest)) }, { level: 1 })
}

/** Every row of a table changed. */
function rowsChanged(files: Files, table: string, change: (row: Record<string, unknown>) => void): void {
  const path = `rows/${table}.ndjson`
  const rows = text(files[path]!).split('\n').slice(0, -1)
  const changed = rows.map((line) => {
    const row = JSON.parse(line) as Record<string, unknown>
    change(row)
    return `${JSON.stringify(row)}\n`
  })
  files[path] = Buffer.from(changed.join(''))
}

const blobPathsOf = (files: Files, table: string, column: string): string[] =>
  text(files[`rows/${table}.ndjson`]!)
    .split('\n')
    .slice(0, -1)
    .map((line) => `blobs/${(JSON.parse(line) as Record<string, string>)[column]}`)

const nothingKept = async () => {
  expect(await rowsOf(to.app, 'workspaces', `id = '${owner.workspaceId}'`)).toEqual([])
  expect(await rowsOf(to.app, 'problems')).toEqual([])
  expect(await rowsOf(to.app, 'archived_people')).toEqual([])
  expect(await rowsOf(to.app, 'blobs', 'adopted')).toEqual([])
}

describe('a forged or damaged archive is refused, saying why, and nothing of it is kept', () => {
  const refusals: [string, RegExp, (files: Files, manifest: ManifestText) => void][] = [
    [
      'coefficients changed',
      /another fingerprint than was exported/,
      (files) => {
        const [path] = blobPathsOf(files, 'problemVersions', 'dataBlobId')
        const bytes = Uint8Array.from(files[path!]!)
        bytes[bytes.length - 9]! ^= 1
        files[path!] = bytes
      },
    ],
    [
      'chains that do not hold, with a fingerprint to match',
      /does not hold|do not fit/,
      (files) => {
        const [path] = blobPathsOf(files, 'embeddings', 'chainsBlobId')
        const { arrays } = unpackArrays(Uint8Array.from(files[path!]!))
        // A qubit that is in the last chain too.
        arrays.qubits![0] = arrays.qubits!.at(-1)!
        const bytes = packArrays(arrays)
        files[path!] = bytes
        rowsChanged(files, 'embeddings', (row) => {
          if (`blobs/${String(row.chainsBlobId)}` === path) row.fingerprint = sum(bytes)
        })
      },
    ],
    [
      'a row of another workspace',
      /refers by workspaceId/,
      (files) => rowsChanged(files, 'machines', (row) => void (row.workspaceId = to.actor.workspaceId)),
    ],
    [
      'a person who is not in it',
      /refers by createdBy/,
      (files) => rowsChanged(files, 'problems', (row) => void (row.createdBy = to.actor.userId)),
    ],
    [
      'a counter of another workspace',
      /counts what is not in it/,
      (files) => rowsChanged(files, 'counters', (row) => void (row.scope = to.actor.workspaceId)),
    ],
    [
      'an array that is missing',
      /is missing/,
      (files) => void Reflect.deleteProperty(files, blobPathsOf(files, 'returns', 'samplesBlobId')[0]!),
    ],
    [
      'samples cut short',
      /do not fit|does not unpack/,
      (files) => {
        const [path] = blobPathsOf(files, 'returns', 'samplesBlobId')
        files[path!] = files[path!]!.slice(0, -64)
      },
    ],
    [
      'a column that there is not',
      /Unrecognized key/,
      (files) => rowsChanged(files, 'runSheets', (row) => void (row.approvedFor = 'ever')),
    ],
    [
      'a state that there is not',
      /runSheets, state/,
      (files) => rowsChanged(files, 'runSheets', (row) => void (row.state = 'free')),
    ],
    [
      'a number that is none',
      /line 1 of calibrations, number/,
      (files) => rowsChanged(files, 'calibrations', (row) => void (row.number = '1')),
    ],
    [
      'a table that there is not',
      /no part of a workspace/,
      (files) => void (files['rows/tokens.ndjson'] = Buffer.from('')),
    ],
    [
      'a path that leads out',
      /no ZIP file|no part of a workspace|does not unpack|relative path/,
      (files) => void (files['../etc/passwd'] = Buffer.from('x')),
    ],
    ['rows that are missing', /instead of/, (files) => void (files['rows/problems.ndjson'] = Buffer.from(''))],
  ]
  it.each(refusals)('%s', async (_name, words, change) => {
    const bytes = forged(change)
    const message = await imported(to, bytes).then(
      (job) => (expect(job.status).toBe('failed'), job.message),
      (error: Error) => error.message,
    )
    expect(message).toMatch(words)
    await nothingKept()
  })

  it('a file that is no archive', async () => {
    await expect(imported(to, Buffer.from('PK\u0003\u0004 and then nothing'))).rejects.toMatchObject({
      code: 'archive.content',
    })
    await expect(imported(to, zipSync({ 'readme.txt': Buffer.from('x') }))).rejects.toMatchObject({
      code: 'archive.content',
    })
  })

  it('one changed after its manifest was written', async () => {
    const files = unzipSync(readFileSync(archive))
    const [path] = blobPathsOf(files, 'problemVersions', 'dataBlobId')
    files[path!] = Uint8Array.from(files[path!]!, (value, k) => (k === 100 ? value ^ 1 : value))
    const job = await imported(to, zipSync(files, { level: 1 }))
    expect(job).toMatchObject({ status: 'failed' })
    expect(job.message).toContain('its SHA-256 differs')
    await nothingKept()
  })
})

describe('an exported workspace', () => {
  it('comes into another installation with every row, array, fingerprint and link as it was', async () => {
    const job = await imported(to, readFileSync(archive))
    expect(job.message).toContain('all fingerprints are the ones that were exported')
    expect(job.status).toBe('done')
    expect(job.detail).toEqual({ workspaceId: owner.workspaceId, workspace: 'Brackwater Ferries' })
    const [before, after] = [await contentsOf(from.app, owner.workspaceId), await contentsOf(to.app, owner.workspaceId)]
    expect(before.embeddings!.length).toBeGreaterThan(2)
    expect(before.returns!.length).toBeGreaterThan(1)
    expect(after).toEqual(before)
  })

  it('gives the very same bundles', async () => {
    const here = { userId: to.actor.userId, workspaceId: owner.workspaceId }
    const frozen = await rowsOf(to.app, 'run_sheets', 'fingerprint is not null')
    expect(frozen.length).toBeGreaterThan(0)
    for (const { id } of frozen) {
      const [before, after] = [
        await bundleOf(from.app, owner, id as string),
        await bundleOf(to.app, here, id as string),
      ]
      expect(Buffer.from(after.bytes).equals(Buffer.from(before.bytes))).toBe(true)
    }
  })

  it('is exported from there with the same rows and arrays', async () => {
    const again = await exported(to.app, { userId: to.actor.userId, workspaceId: owner.workspaceId })
    const [first, second] = [unzipSync(readFileSync(archive)), unzipSync(readFileSync(again))]
    const sumsOf = (files: typeof first) =>
      Object.values(
        (JSON.parse(Buffer.from(files['manifest.json']!).toString()) as { blobs: Record<string, { sha256: string }> })
          .blobs,
      )
        .map(({ sha256 }) => sha256)
        .sort()
    expect(sumsOf(second)).toEqual(sumsOf(first))
    expect(Object.keys(second).length).toBe(Object.keys(first).length)
  })
})

describe('people of an imported workspace', () => {
  const here = () => ({ userId: to.actor.userId, workspaceId: owner.workspaceId })

  it('are known by name, have no account, and wait for an invitation', async () => {
    const waiting = (await archivedMembers(to.app, here(), { limit: 50 })).items
    expect(waiting.map(({ email, roles }) => [email.split('@')[0], roles.length > 0])).toEqual(
      expect.arrayContaining([
        ['developer', true],
        ['reviewer', true],
      ]),
    )
    expect(await rowsOf(to.app, 'users', 'email is not null')).toHaveLength(1)
    expect(await rowsOf(to.app, 'memberships', `workspace_id = '${owner.workspaceId}'`)).toHaveLength(1)
  })

  it('have done there what they did, once they come by the address that the archive names', async () => {
    const [sheet] = await rowsOf(from.app, 'run_sheets', `state = 'in review'`)
    const { link } = await invite(to.app, here(), {
      email: 'developer@brackwater.example',
      roles: ['developer', 'reviewer'],
    })
    const secret = link!.split('/').at(-1)!
    const developer = await acceptInvitation(
      to.app,
      plainPasswords,
      secret,
      { name: 'Wanja', password: 'ferries at dawn, all of them' },
      '127.0.0.1',
    )
    const [moved] = await rowsOf(to.app, 'run_sheets', `id = '${String(sheet!.id)}'`)
    expect(moved!.prepared_by).toBe(developer.userId)
    await expect(handOver(to.app, developer, String(sheet!.id), 'approve', '')).rejects.toMatchObject({
      kind: 'forbidden',
    })
    expect((await archivedMembers(to.app, here(), { limit: 50 })).items.map(({ email }) => email)).not.toContain(
      'developer@brackwater.example',
    )
  })

  it('may be taken once only: ids stay, so that nothing can be here twice', async () => {
    const job = await imported(to, readFileSync(archive))
    expect(job).toMatchObject({ status: 'failed' })
    expect(job.message).toContain('is in this installation already')
    const renamed = forged((files, manifest) => {
      const id = '00000000-0000-4000-8000-000000000000'
      manifest.workspace.id = id
      for (const path of Object.keys(files))
        if (path.startsWith('rows/')) files[path] = Buffer.from(text(files[path]!).replaceAll(owner.workspaceId, id))
    })
    expect((await imported(to, renamed)).message).toContain('is in this installation already')
    expect(await rowsOf(to.app, 'workspaces', `id = '00000000-0000-4000-8000-000000000000'`)).toEqual([])
  })
})

it('a cancelled import keeps nothing', async () => {
  const other = await startTestApp(1)
  try {
    const { app } = other
    const subjectId = await app.blobs.writeFile(archive)
    await app.db.transaction((tx) => app.blobs.adopt(tx, subjectId))
    const job = { subjectId, createdBy: other.actor.userId } as JobRow
    const nothing = () => {}
    const context = { job, signal: AbortSignal.abort(), report: nothing, log: nothing }
    const outcome = await JOB_KINDS.import.run(app, context)
    await app.db.transaction((tx) => outcome.save(tx))
    expect(outcome.status).toBe('cancelled')
    expect(await rowsOf(app, 'workspaces')).toHaveLength(1)
    expect(await rowsOf(app, 'blobs', 'adopted')).toEqual([])
  } finally {
    await other.close()
  }
})

it('tells what an export holds', async () => {
  const view = await workspaceView(from.app, owner)
  expect(view).toMatchObject({ name: 'Brackwater Ferries', deletesAt: null })
  expect(view.holds.problems).toBe((await rowsOf(from.app, 'problems')).length)
  const sizes = Object.values(
    (JSON.parse(text(unzipSync(readFileSync(archive))['manifest.json']!)) as ManifestText).blobs,
  )
  expect(view.bytes).toBe(sizes.reduce((total, { bytes }) => total + bytes, 0))
})
