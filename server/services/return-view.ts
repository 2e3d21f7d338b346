import { histogram } from '../../shared/engine/problem/histogram'
import type { Decoding, ReturnView } from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import { findJobOfSubject } from '../database/repositories/jobs'
import { personOf } from '../database/repositories/problems'
import type { ReturnRow, RunSheetRow } from '../database/repositories/run-sheets'
import { liftedSolutions } from './lifted-solutions'
import { loadReturn } from './loaded-return'
import { standingOf } from './problem-difference'
import type { Bench } from './programming'
import { breaksView } from './return-breaks'
import { decodingRow, energiesView, weighted } from './return-energies'
import { referenceOfSamples } from './return-reference'
import { listedSolutions, solutionViews } from './return-solutions'
import { decodedBy } from './return-summary'
import { returnRow } from './returns'
import { benchOf, runSheetRow } from './run-sheets'
import { violationsView } from './violations'

const SHOWN_SOLUTIONS = 20
const PHYSICAL_BINS = 24

/** What there is to say before the samples are there. */
const NOTHING_YET = {
  breaks: null,
  decodings: [],
  energies: null,
  best: null,
  liftedTo: null,
  solutions: [],
  distinct: 0,
  physicalEnergies: [],
  reference: null,
  violations: null,
} satisfies Partial<ReturnView>

/** Which samples these are, and of what: all that is known of them whether they are there or not. */
export async function aboutReturn(
  app: App,
  row: ReturnRow,
  sheet: RunSheetRow,
  { problem, row: embedding, machine }: Bench,
) {
  return {
    id: row.id,
    number: row.number,
    source: row.source,
    runSheet: { id: sheet.id, number: sheet.number, name: sheet.name, state: sheet.state },
    problem: {
      id: problem.id,
      number: problem.number,
      name: problem.name,
      variables: problem.variables,
      form: problem.form,
      sense: problem.sense,
    },
    ofVersion: await standingOf(app, problem),
    embedding: { id: embedding.id, number: embedding.number },
    machine: { id: machine.machine.id, name: machine.machine.name, calibration: machine.calibration.number },
    made: row.made,
    version: row.version,
    reads: row.reads,
    createdAt: row.createdAt.toISOString(),
  }
}

/** What the samples say, decoded one way, with the other ways beside it. */
export async function returnView(
  app: App,
  actor: Actor,
  id: string,
  decode: Decoding,
  feasibleOnly: boolean,
): Promise<ReturnView> {
  const row = await returnRow(app, actor, id)
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const loaded = row.status === 'ready' ? await loadReturn(app, actor, row) : null
  const bench = loaded?.bench ?? (await benchOf(app, actor, row))
  const job = await findJobOfSubject(app.db, id)
  const base: Omit<ReturnView, keyof typeof NOTHING_YET> = {
    ...(await aboutReturn(app, row, sheet, bench)),
    status: row.status,
    jobId: job?.id ?? null,
    reason: row.reason,
    seconds: row.seconds,
    decode,
    feasibleOnly,
    createdBy: await personOf(app.db, row.createdBy),
  }
  if (!loaded) return { ...base, ...NOTHING_YET }
  const shown = decodedBy(loaded.summary, decode)
  const listed = await listedSolutions(app, bench, shown, { limit: SHOWN_SOLUTIONS, feasibleOnly })
  const lifted = await liftedSolutions(app, bench, listed.solutions)
  const solutions = solutionViews(bench, listed.solutions, lifted?.rows)
  return {
    ...base,
    breaks: breaksView(loaded),
    decodings: loaded.summary.decoded.map((decoded) => decodingRow(bench, decoded)),
    energies: await energiesView(app, actor, row, bench, shown),
    best: solutions[0] ?? null,
    liftedTo: lifted?.to ?? null,
    solutions,
    distinct: listed.distinct,
    physicalEnergies: histogram(loaded.summary.physical, PHYSICAL_BINS),
    reference: await referenceOfSamples(app, bench, weighted(shown)),
    violations: violationsView(bench.problem.groups, listed),
  }
}
