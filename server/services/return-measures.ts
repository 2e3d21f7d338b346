import type { ReturnMeasures } from '../../shared/schemas/return-comparison'
import type { Actor, App } from '../app'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { keepMeasures } from '../database/repositories/run-sheets'
import type { LoadedReturn } from './loaded-return'
import { loadReturn } from './loaded-return'
import { unpackSamples } from './samples-data'
import { temperatureView } from './success-view'

function strengthOf({ programming: { layout, strengths } }: LoadedReturn): ReturnMeasures['strength'] {
  const held = strengths.filter((_, variable) => layout.chainLength[variable]! > 1)
  if (held.length === 0) return null
  const min = held.reduce((least, k) => Math.min(least, k), Infinity)
  const max = held.reduce((most, k) => Math.max(most, k), 0)
  return { min, mean: held.reduce((sum, k) => sum + k, 0) / held.length, max }
}

/** What comparisons show of samples, worked out once; samples, embedding and settings of a return stand still. */
export async function measuresOf(app: App, actor: Actor, row: ReturnRow): Promise<ReturnMeasures> {
  if (row.measures) return row.measures
  const loaded = await loadReturn(app, actor, row)
  const { programmed, summary } = loaded
  const { breaks } = summary
  const samples = unpackSamples(await app.blobs.read(row.samplesBlobId!))
  const { seed } = row.settings
  const temperature = temperatureView(await app.compute.run('readTemperature', { samples, programmed, seed }))
  const measures: ReturnMeasures = {
    chainReads: { count: breaks.perChain.breaks.reduce((sum, n) => sum + n, 0), total: breaks.chainReads },
    strength: strengthOf(loaded),
    scale: programmed.scale,
    temperature: temperature && { ...temperature, rowsInAll: samples.rows },
  }
  await keepMeasures(app.db, row.id, measures)
  return measures
}
