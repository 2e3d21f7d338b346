import type { App } from '../app'
import { isAlive } from '../database/client'

export interface HealthView {
  status: 'ok' | 'failing'
  database: 'ok' | 'failing'
  queue: 'ok' | 'stopped'
  version: string
}

/** Whether the parts that everything rests on answer. */
export async function health(app: App): Promise<HealthView> {
  const database = (await isAlive(app.db)) ? 'ok' : 'failing'
  const queue = app.queue.running() ? 'ok' : 'stopped'
  return { status: database === 'ok' && queue === 'ok' ? 'ok' : 'failing', database, queue, version: app.version }
}
