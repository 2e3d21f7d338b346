import { cpSync } from 'node:fs'
import { inject } from 'vitest'
import type { RunningServer } from './server'
import { startServer, temporaryFolder } from './server'

/** A demo workspace of the caller's own, seeded already. */
export function startDemo(): Promise<RunningServer> {
  const folder = temporaryFolder()
  cpSync(inject('demoFolder'), folder, { recursive: true })
  return startServer({ DEMO: 'true', DATA_DIR: folder })
}
