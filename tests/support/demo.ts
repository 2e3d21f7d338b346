import { seededFolder } from './folders'
import type { RunningServer } from './server'
import { startServer } from './server'

/** A demo workspace of the caller's own, seeded already, with the limits that pages have to do with. */
export const startDemo = (): Promise<RunningServer> =>
  startServer({ DEMO: 'true', DATA_DIR: seededFolder(), RATE_LIMIT: '', RATE_LIMIT_ADDRESS: '' })
