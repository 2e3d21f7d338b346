import { seededFolder } from './folders'
import type { RunningServer } from './server'
import { startServer } from './server'

/** A demo workspace of the caller's own, seeded already. */
export const startDemo = (): Promise<RunningServer> => startServer({ DEMO: 'true', DATA_DIR: seededFolder() })
