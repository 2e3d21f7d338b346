import { thermalGigahertz } from '../../shared/engine/machine/energy-units'
import { isStraight } from '../../shared/engine/programming/schedule'
import { adviceFor } from '../../shared/engine/readout/advice/advise'
import type { AdviceItem } from '../../shared/engine/readout/advice/item'
import type {
  AdviceView,
  AnalysisQuery,
  AnalysisView,
  GaugeView,
  SuccessView,
} from '../../shared/schemas/return-analysis'
import type { Actor, App } from '../app'
import type { ReturnRow } from '../database/repositories/run-sheets'
import type { AnalyseInput, Analysis } from '../workers/tasks/analyse'
import { knownOptimum } from './known-optimum'
import { loadReturn, readyRow } from './loaded-return'
import type { LoadedReturn } from './loaded-return'
import type { Bench } from './programming'
import { proportion } from './proportion'
import { Recent } from './recent'
import { evidenceOf, scaleRoom } from './return-evidence'
import { decodedBy } from './return-summary'
import { unpackSamples } from './samples-data'
import { signed, signOf } from './sense'
import { successView, temperatureView, timeOfReads } from './success-view'

/** A pause needs two points more than the straight ramp. */
const POINTS_WITH_PAUSE = 4

/** By everything that decides them; what is being worked out is waited for by all who ask. */
const analyses = new Recent<Promise<Analysis>>(16)

export interface Analysed extends LoadedReturn {
  row: ReturnRow
  reference: { energy: number; proved: boolean } | null
  analysis: Analysis
  advice: AdviceItem[]
}

/** Energy table and kT, where the machine takes a schedule and the samples were annealed straight. */
function pauseInput({ machine: { sheet } }: Bench, { settings }: ReturnRow): AnalyseInput['pause'] {
  const { energyTable: table, temperatureMillikelvin: millikelvin, timing } = sheet
  const isRamp = !settings.schedule || isStraight(settings.schedule)
  if (!table || millikelvin === null || !isRamp || (timing.schedulePointsMax ?? 0) < POINTS_WITH_PAUSE) return null
  return { table, kT: thermalGigahertz(millikelvin) }
}

/** Analyses the samples in a thread, unless that was done just now. */
export async function analysed(
  app: App,
  actor: Actor,
  id: string,
  { decode: method, gap }: AnalysisQuery,
): Promise<Analysed> {
  const row = await readyRow(app, actor, id)
  const loaded = await loadReturn(app, actor, row)
  const { bench, programming, programmed, summary } = loaded
  const { ising, problem } = bench
  const reference = await knownOptimum(app, bench)
  const groups = problem.groups ?? []
  const run = async (): Promise<Analysis> =>
    app.compute.run('analyse', {
      samples: unpackSamples(await app.blobs.read(row.samplesBlobId!)),
      breaks: summary.breaks,
      physical: summary.physical,
      decoded: decodedBy(summary, method),
      programmed,
      ising,
      bounds: programming.bounds.bound,
      seed: row.settings.seed,
      reference: reference && { energy: reference.energy, gap, tolerance: reference.tolerance },
      groups,
      greatestScale: scaleRoom(bench, programming).greatest,
      pause: pauseInput(bench, row),
    })
  const key = JSON.stringify([id, method, gap, reference, groups, problem.fingerprint])
  const found = analyses.get(key, run)
  try {
    const analysis = await found
    const evidence = await evidenceOf(app, actor, row, { ...loaded, analysis })
    return { ...loaded, row, reference, analysis, advice: adviceFor(evidence) }
  } catch (error) {
    analyses.drop(key, found)
    throw error
  }
}

function successOf({ row, bench, reference, analysis: { success } }: Analysed): SuccessView | null {
  if (!success || !reference) return null
  return {
    ...successView(success, timeOfReads(row, bench)),
    reference: { energy: signed(signOf(bench.problem.sense), reference.energy), proved: reference.proved },
  }
}

function gaugeViews({ bench, analysis }: Analysed): GaugeView[] {
  const sign = signOf(bench.problem.sense)
  return analysis.gauges.map(
    ({ gauge, reads, readsWithBreak, breaks, chainReads, energy, successes, temperature }) => ({
      gauge,
      reads,
      readsWithBreak: proportion(readsWithBreak, reads),
      chainReads: proportion(breaks, chainReads),
      energy: energy && { mean: signed(sign, energy.mean), standardError: energy.standardError },
      success: successes === null ? null : proportion(successes, reads),
      temperature: temperatureView(temperature),
    }),
  )
}

const adviceView = ({ kind, action, sentence, evidence }: AdviceItem): AdviceView => ({
  kind,
  action,
  isSetting: 'set' in action,
  sentence,
  evidence,
})

/** What samples say beyond their summary, and what to change next. */
export async function analysisView(app: App, actor: Actor, id: string, query: AnalysisQuery): Promise<AnalysisView> {
  const all = await analysed(app, actor, id, query)
  const { row, bench, programming, programmed, summary, analysis, advice } = all
  const { reads, perRead } = summary.breaks
  const temperature = temperatureView(analysis.temperature)
  return {
    ...query,
    reads,
    success: successOf(all),
    breaks: analysis.byMeasure,
    gauges: gaugeViews(all),
    gaugeTests: analysis.differences,
    temperature: temperature && { ...temperature, rowsInAll: perRead.brokenChains.length },
    scale: {
      value: programmed.scale,
      greatest: scaleRoom(bench, programming).greatest,
      limitedBy: programmed.limitedBy,
      outlook: analysis.outlook,
    },
    advice: advice.map(adviceView),
    seed: row.settings.seed,
    version: app.version,
  }
}
