import { createBlobStore } from '../../server/database/repositories/blobs'
import { openDatabase } from '../../server/database/client'
import { memberships } from '../../server/database/schema'
import type { App } from '../../server/app'
import { seedLibrary } from '../../tests/support/library'
import { startProcess, until } from '../../tests/support/server'

export const OWNER = { email: 'owner@bench.example', password: 'a library for the bench' }

export interface Running {
  url: string
  stop(): Promise<void>
}

/** Starts the built server on a data folder, without limits on requests where none are given. @throws Error when it does not become healthy */
export async function serve(
  entry: string,
  folder: string,
  port: number,
  settings: Record<string, string> = {},
): Promise<Running & { output(): string; pid: number }> {
  const env = {
    HOST: '127.0.0.1',
    PORT: String(port),
    DATA_DIR: folder,
    NUXT_SESSION_PASSWORD: 'x'.repeat(40),
    ...settings,
  }
  const started = startProcess(entry, env)
  const url = `http://127.0.0.1:${port}`
  const isHealthy = () => {
    if (started.child.exitCode !== null) throw new Error(`the server stopped:\n${started.output()}`)
    return fetch(`${url}/api/health`).then(
      ({ ok }) => ok,
      () => false,
    )
  }
  await until(isHealthy, 300, 'a healthy server')
  return { url, pid: started.child.pid!, output: started.output, stop: () => started.stop() }
}

/** The first account of the installation, with the code that the server prints for it. */
export async function setUp({ url, output }: Running & { output(): string }): Promise<void> {
  const code = await until(() => /one-time code: (\S+)/.exec(output())?.[1], 60, 'a set-up code')
  const body = JSON.stringify({ code, workspace: 'Brackwater Ferries', name: 'Owner', ...OWNER })
  const answer = await fetch(`${url}/api/setup`, {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body,
  })
  if (!answer.ok) throw new Error(`the set-up was refused: ${await answer.text()}`)
}

/** Fills the workspace of the folder's only member. No server may run on it meanwhile. */
export async function fill(folder: string, problems: number): Promise<void> {
  const database = await openDatabase({ dataFolder: folder })
  const blobs = createBlobStore(database, () => new Date())
  const [member] = await database.db.select().from(memberships)
  const app = { database, db: database.db, blobs } as unknown as App
  await seedLibrary(app, { userId: member!.userId, workspaceId: member!.workspaceId }, { problems, seed: 1 })
  await database.close()
}
