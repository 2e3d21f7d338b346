import { createHash } from 'node:crypto'
import type { App } from '../../server/app'

type Rows = Record<string, unknown>[]

/** Tables by the database itself, not by the code under test. */
export async function rowsOf(app: App, table: string, where = 'true'): Promise<Rows> {
  const result = await app.database.executeSql(`select * from ${table} where ${where}`)
  return result.rows.map((row) => ({ ...row }))
}

const WITH_WORKSPACE = [
  'machines',
  'problems',
  'reference_optima',
  'embeddings',
  'capacity_measurements',
  'run_sheets',
  'returns',
  'scans',
  'answer_sheets',
  'budget_entries',
]
const PEOPLE = ['created_by', 'version_by', 'prepared_by', 'reviewed_by', 'by', 'revoked_by']
const LEFT_OUT = ['breaks_blob_id', 'summary_blob_id', 'measures']

async function blobSum(app: App, id: unknown): Promise<string | null> {
  if (typeof id !== 'string') return null
  return createHash('sha256')
    .update(await app.blobs.read(id))
    .digest('hex')
}

/** A row without what may differ from one installation to the other: blobs by their contents, people by their names. */
async function comparable(app: App, row: Record<string, unknown>, names: Map<unknown, unknown>) {
  const out: Record<string, unknown> = {}
  for (const [column, value] of Object.entries(row)) {
    if (LEFT_OUT.includes(column)) continue
    if (column.endsWith('blob_id')) out[column] = await blobSum(app, value)
    else if (PEOPLE.includes(column)) out[column] = value === null ? null : names.get(value)
    else if (column === 'reading') {
      const { rejectedBlobId, ...reading } = value as { rejectedBlobId?: string }
      out.reading = { ...reading, rejected: await blobSum(app, rejectedBlobId) }
    } else out[column] = value instanceof Date ? value.toISOString() : value
  }
  return out
}

export async function contentsOf(app: App, workspaceId: string): Promise<Record<string, unknown[]>> {
  const names = new Map((await rowsOf(app, 'users')).map(({ id, name }) => [id, name]))
  const contents: Record<string, unknown[]> = {}
  const tables: [string, string][] = [
    ...WITH_WORKSPACE.map((table): [string, string] => [table, `workspace_id = '${workspaceId}'`]),
    ['problem_versions', `problem_id in (select id from problems where workspace_id = '${workspaceId}')`],
    ['reductions', `problem_id in (select id from problems where workspace_id = '${workspaceId}')`],
    ['calibrations', `machine_id in (select id from machines where workspace_id = '${workspaceId}')`],
    ['broken_embeddings', `machine_id in (select id from machines where workspace_id = '${workspaceId}')`],
    ['run_sheet_remarks', `run_sheet_id in (select id from run_sheets where workspace_id = '${workspaceId}')`],
    [
      'counters',
      `scope = '${workspaceId}' or scope in (select id from problems where workspace_id = '${workspaceId}')`,
    ],
  ]
  for (const [table, where] of tables) {
    const rows = await Promise.all((await rowsOf(app, table, where)).map((row) => comparable(app, row, names)))
    contents[table] = rows.map((row) => JSON.stringify(row)).sort()
  }
  return contents
}
