import { rmSync } from 'node:fs'
import type { TestProject } from 'vitest/node'
import { ensureBuild } from '../../scripts/build.mjs'
import { startServer, temporaryFolder } from '../support/server'

declare module 'vitest' {
  interface ProvidedContext {
    /** Data folder of a demo workspace that was seeded once; tests work on copies. */
    demoFolder: string
  }
}

export default async function setup(project: TestProject): Promise<() => void> {
  ensureBuild()
  const folder = temporaryFolder()
  const server = await startServer({ DEMO: 'true', DATA_DIR: folder })
  await server.stop()
  project.provide('demoFolder', folder)
  return () => rmSync(folder, { recursive: true })
}
