import { rmSync } from 'node:fs'
import type { TestProject } from 'vitest/node'
import { ensureBuild } from '../../scripts/build.mjs'
import { startServer, temporaryFolder } from '../support/server'

declare module 'vitest' {
  interface ProvidedContext {
    /** Data folder of a database that holds nothing yet. */
    emptyFolder: string
    /** Data folder of a demo workspace that was seeded once. */
    seededFolder: string
  }
}

interface Folders {
  empty: string
  seeded: string
}

const SESSION = { NUXT_SESSION_PASSWORD: 'a-password-of-at-least-thirty-two-characters', ALLOW_PLAIN_HTTP: 'true' }

/** Starts the built server once on a folder of its own, which has then all that a first start makes. */
async function prepared(env: Record<string, string>): Promise<string> {
  const folder = temporaryFolder()
  const server = await startServer({ ...env, DATA_DIR: folder })
  await server.stop()
  return folder
}

async function prepare(): Promise<Folders> {
  const [empty, seeded] = await Promise.all([
    prepared({ ...SESSION, PUBLIC_URL: 'http://localhost:3000' }),
    prepared({ DEMO: 'true' }),
  ])
  process.once('exit', () => [empty, seeded].forEach((folder) => rmSync(folder, { recursive: true, force: true })))
  return { empty, seeded }
}

/** Kept outside this module, which each project loads for itself. */
const shared = globalThis as { preparedFolders?: Promise<Folders> }

/**
 * Server and browser tests run against the production build. Making a database and seeding the demo take seconds each, so
 * both are done once and tests work on copies (tests/support/folders.ts).
 */
export default async function setup(project: TestProject): Promise<void> {
  ensureBuild()
  const { empty, seeded } = await (shared.preparedFolders ??= prepare())
  project.provide('emptyFolder', empty)
  project.provide('seededFolder', seeded)
}
