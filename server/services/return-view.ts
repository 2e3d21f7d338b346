import { chainLengths } from '../../shared/engine/readout/breaks'
import { histogram as energyHistogram, weightsInBins } from '../../shared/engine/readout/energies'
import { histogram } from '../../shared/engine/problem/histogram'
import type { Programmed } from '../../shared/engine/programming/programme'
import { DomainError } from '../../shared/errors'
import type {
  ChainBreaks,
  CouplerBreaks,
  Decoding,
  DecodingRow,
  EnergySeries,
  LiftedSolution,
  ReturnView,
  SolutionRow,
  SolutionView,
} from '../../shared/schemas/returns'
import type { Actor, App } from '../app'
import { findJobOfSubject } from '../database/repositories/jobs'
import { personOf } from '../database/repositories/problems'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { returnToCompare } from '../database/repositories/run-sheets'
import type { DecodedSummary, Summary } from '../workers/tasks/summarise'
import { liftedSolutions } from './lifted-solutions'
import type { Bench, Programming } from './programming'
import { programmeBench, requireProgrammed } from './programming'
import { standingOf } from './problem-difference'
import { proportion } from './proportion'
import { referenceOfSamples } from './return-reference'
import { returnRow } from './returns'
import { benchOf, runSheetRow } from './run-sheets'
import { readsIn, unpackSamples } from './samples-data'
import { signed, signOf } from './sense'
import { violationsView } from './violations'

const METHODS: readonly Decoding[] = ['majority', 'discard', 'descent']
const TITLES: Record<Decoding, string> = {
  majority: 'Majority',
  discard: 'Discard broken reads',
  descent: 'Energy-descent repair',
}
const SHOWN_SOLUTIONS = 20
const ENERGY_BINS = 36
const PHYSICAL_BINS = 24
/** Values by label in one answer of solutions: each takes some tens of bytes on the way out. */
const MAX_VALUES = 4_000_000
/** Cells of a samples file: three characters each, below the longest text there can be. */
const MAX_CELLS = 150_000_000

interface Loaded {
  bench: Bench
  programming: Programming
  programmed: Programmed
  summary: Summary
}

async function load(app: App, actor: Actor, row: ReturnRow, methods: Decoding[], solutions: number): Promise<Loaded> {
  const bench = await benchOf(app, actor, row)
  const programming = programmeBench(bench, row.settings)
  const programmed = requireProgrammed(programming)
  const samples = unpackSamples(await app.blobs.read(row.samplesBlobId!))
  const summary = await app.compute.run('summarise', {
    samples,
    programmed,
    ising: bench.ising,
    seed: row.settings.seed,
    methods,
    solutions,
    groups: bench.problem.groups ?? [],
  })
  return { bench, programming, programmed, summary }
}

/** What there is to say before the samples are there. */
const NOTHING_YET = {
  breaks: null,
  decodings: [],
  energies: null,
  best: null,
  liftedTo: null,
  solutions: [],
  physicalEnergies: [],
  reference: null,
  violations: null,
} satisfies Partial<ReturnView>

/** What the samples say, decoded one way, with the other ways beside it. */
export async function returnView(app: App, actor: Actor, id: string, decode: Decoding): Promise<ReturnView> {
  const row = await returnRow(app, actor, id)
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const bench = await benchOf(app, actor, row)
  const { problem, machine } = bench
  const job = await findJobOfSubject(app.db, id)
  const base: Omit<ReturnView, keyof typeof NOTHING_YET> = {
    id,
    number: row.number,
    source: row.source,
    status: row.status,
    jobId: job?.id ?? null,
    reason: row.reason,
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
    embedding: { id: bench.row.id, number: bench.row.number },
    machine: { id: machine.machine.id, name: machine.machine.name, calibration: machine.calibration.number },
    made: row.made,
    seconds: row.seconds,
    version: row.version,
    reads: row.reads,
    decode,
    createdBy: await personOf(app.db, row.createdBy),
    createdAt: row.createdAt.toISOString(),
  }
  if (row.status !== 'ready') return { ...base, ...NOTHING_YET }
  const loaded = await load(app, actor, row, [...METHODS], SHOWN_SOLUTIONS)
  const shown = loaded.summary.decoded.find(({ method }) => method === decode)!
  const lifted = await liftedSolutions(app, bench, shown.solutions)
  const solutions = solutionViews(bench, shown, lifted?.rows)
  return {
    ...base,
    breaks: breaksView(loaded),
    decodings: loaded.summary.decoded.map((decoded) => decodingRow(bench, decoded)),
    energies: await energiesView(app, actor, row, bench, shown),
    best: solutions[0] ?? null,
    liftedTo: lifted?.to ?? null,
    solutions,
    physicalEnergies: histogram(loaded.summary.physical, PHYSICAL_BINS),
    reference: await referenceOfSamples(app, bench, shown),
    violations: violationsView(problem.groups, shown),
  }
}

function breaksView({ bench, programming, programmed, summary }: Loaded): ReturnView['breaks'] {
  const { breaks } = summary
  const ids = bench.machine.fabric.ids
  const lengths = chainLengths(programmed)
  const chains: ChainBreaks[] = bench.labels.map((label, i) => ({
    variable: i,
    label,
    length: lengths[i]!,
    strength: programmed.chainStrength[i]!,
    cutBound: programming.bounds.bound[i]!,
    cutBoundExact: programming.bounds.exact[i] === 1,
    cutSplit: lengths[i]! > 1 ? programming.bounds.splits[i]! : null,
    ...proportion(breaks.perChain.breaks[i]!, breaks.reads),
  }))
  const couplers: CouplerBreaks[] = []
  programmed.isChainCoupler.forEach((inside, c) => {
    if (!inside || breaks.perCoupler[c] === 0) return
    const [a, b] = [programmed.ends[2 * c]!, programmed.ends[2 * c + 1]!]
    couplers.push({
      a: ids[programmed.qubits[a]!]!,
      b: ids[programmed.qubits[b]!]!,
      label: bench.labels[programmed.chainOf[a]!]!,
      ...proportion(breaks.perCoupler[c]!, breaks.reads),
    })
  })
  const chainBreaks = chains.reduce((sum, { count }) => sum + count, 0)
  return {
    chains,
    couplers: couplers.sort((x, y) => y.rate - x.rate),
    readsWithBreak: proportion(breaks.readsWithBreak, breaks.reads),
    chainReads: proportion(chainBreaks, breaks.chainReads),
    perRead: breaks.perRead.histogram,
  }
}

/** Mean and median of energies weighted by reads; null without reads. */
function centre({
  energies,
  counts,
}: Pick<DecodedSummary, 'energies' | 'counts'>): { mean: number; median: number; total: number } | null {
  const reads = readsIn({ counts })
  if (reads === 0) return null
  const order = Array.from(energies.keys()).sort((a, b) => energies[a]! - energies[b]!)
  let below = 0
  let median = energies[order[0]!]!
  for (const row of order) {
    median = energies[row]!
    below += counts[row]!
    if (2 * below >= reads) break
  }
  const total = energies.reduce((sum, energy, row) => sum + energy * counts[row]!, 0)
  return { mean: total / reads, median, total }
}

function decodingRow({ problem }: Bench, decoded: DecodedSummary): DecodingRow {
  const sign = signOf(problem.sense)
  const middle = centre(decoded)
  const best = decoded.energies.reduce((least, energy) => Math.min(least, energy), Infinity)
  const bestCount = decoded.counts.reduce((sum, count, row) => sum + (decoded.energies[row] === best ? count : 0), 0)
  return {
    decoding: decoded.method,
    title: TITLES[decoded.method],
    readsKept: readsIn(decoded),
    ties: decoded.ties,
    best: middle ? signed(sign, best) : null,
    bestCount,
    median: middle ? signed(sign, middle.median) : null,
    mean: middle ? signed(sign, middle.mean) : null,
    total: middle ? signed(sign, middle.total) : null,
  }
}

const nameOf = (row: ReturnRow): string =>
  row.source === 'rehearsal' ? `Rehearsal ${row.number}` : `Samples ${row.number}`

/** Energies of this return and of the one it is best compared with, on the same bins. */
async function energiesView(
  app: App,
  actor: Actor,
  row: ReturnRow,
  bench: Bench,
  shown: DecodedSummary,
): Promise<ReturnView['energies']> {
  const middle = centre(shown)
  if (!middle) return null
  const sign = signOf(bench.problem.sense)
  const all: { row: ReturnRow; energies: Float64Array; counts: Uint32Array }[] = [
    { row, energies: shown.energies, counts: shown.counts },
  ]
  const other = await returnToCompare(app.db, row)
  if (other) {
    const { summary } = await load(app, actor, other, [shown.method], 0)
    all.push({ row: other, energies: summary.decoded[0]!.energies, counts: summary.decoded[0]!.counts })
  }
  const values = Float64Array.from(
    all.flatMap(({ energies }) => Array.from(energies, (energy) => signed(sign, energy))),
  )
  // The first histogram fixes bins that hold every value; each series is then counted into them.
  const { start, step, counts } = energyHistogram(values, new Uint32Array(values.length).fill(1), ENERGY_BINS)
  const series: EnergySeries[] = all.map((entry) => ({
    title: nameOf(entry.row),
    returnId: entry.row.id,
    reads: readsIn(entry),
    counts: weightsInBins(
      entry.energies.map((energy) => signed(sign, energy)),
      entry.counts,
      { start, step, bins: counts.length },
    ),
  }))
  const { best, bestCount, mean, median } = decodingRow(bench, shown)
  return { best: best!, bestCount, mean: mean!, median: median!, start, width: step, series }
}

function solutionRows(
  { labels, problem }: Bench,
  { solutions }: DecodedSummary,
  lifted: readonly LiftedSolution[] | undefined,
): SolutionRow[] {
  const sign = signOf(problem.sense)
  return solutions.map(({ energy, count, distance, spins }, k) => ({
    energy: signed(sign, energy),
    count,
    distance,
    assignment: Object.fromEntries(
      labels.map((label, i) => [label, problem.form === 'qubo' ? (spins[i]! + 1) / 2 : spins[i]!]),
    ),
    lifted: lifted?.[k] ?? null,
  }))
}

/** Solutions with the parts of their energies, in the Ising form. */
function solutionViews(
  bench: Bench,
  decoded: DecodedSummary,
  lifted: readonly LiftedSolution[] | undefined,
): SolutionView[] {
  const { linear, rows, cols, values, offset } = bench.ising
  const sign = signOf(bench.problem.sense)
  return solutionRows(bench, decoded, lifted).map((row, k) => {
    const { spins } = decoded.solutions[k]!
    const fields = linear.reduce((sum, h, i) => sum + h * spins[i]!, 0)
    const interactions = values.reduce((sum, J, e) => sum + J * spins[rows[e]!]! * spins[cols[e]!]!, 0)
    const parts = {
      linear: signed(sign, fields),
      interactions: signed(sign, interactions),
      offset: signed(sign, offset),
    }
    return { ...row, parts }
  })
}

/** The best distinct decoded assignments. */
export async function solutionsOf(
  app: App,
  actor: Actor,
  id: string,
  decode: Decoding,
  limit: number,
): Promise<SolutionRow[]> {
  const row = await readyRow(app, actor, id)
  const { bench, summary } = await load(app, actor, row, [decode], limit)
  const most = Math.max(1, Math.floor(MAX_VALUES / bench.ising.n))
  const shown = summary.decoded[0]!
  if (shown.solutions.length > most)
    throw new DomainError('too large', 'solutions.size', `Ask for at most ${most} solutions of this problem (limit).`)
  const lifted = await liftedSolutions(app, bench, shown.solutions)
  return solutionRows(bench, shown, lifted?.rows)
}

/** The raw samples as CSV: a header of qubit numbers, one line a row, with counts. */
export async function samplesFile(
  app: App,
  actor: Actor,
  id: string,
): Promise<{ fileName: string; bytes: Uint8Array }> {
  const row = await readyRow(app, actor, id)
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const bench = await benchOf(app, actor, row)
  const { qubits } = requireProgrammed(programmeBench(bench, row.settings))
  const samples = unpackSamples(await app.blobs.read(row.samplesBlobId!))
  const { rows, width } = samples
  if (rows * (width + 1) > MAX_CELLS)
    throw new DomainError(
      'too large',
      'samples.size',
      `${rows} rows of ${width} qubits are too much for one CSV file. Rehearse with fewer reads to take the samples out.`,
    )
  const qubitIds = Array.from(qubits, (q) => bench.machine.fabric.ids[q]!)
  const { bytes } = await app.compute.run('writeSamplesFile', { samples, qubitIds })
  return { fileName: `RS-${sheet.number}-${row.source}-${row.number}.csv`, bytes }
}

async function readyRow(app: App, actor: Actor, id: string): Promise<ReturnRow> {
  const row = await returnRow(app, actor, id)
  if (row.status === 'ready') return row
  throw new DomainError(
    'wrong state',
    'return.not-ready',
    `These samples are ${row.status}${row.reason ? `: ${row.reason}` : ''}.`,
  )
}

/**
 * Assignments of the problem that this one was reduced from, in place of its own.
 * @throws DomainError when it was not reduced from another one
 */
export const inOriginal = (rows: readonly SolutionRow[]): SolutionRow[] =>
  rows.map((row) => {
    if (!row.lifted)
      throw new DomainError(
        'not acceptable',
        'solutions.lifted',
        'This problem is not what a pre-solve left of another one. Leave `lifted` out.',
      )
    return { ...row, energy: row.lifted.energy ?? row.energy, assignment: row.lifted.assignment }
  })

/** One line per assignment: energy, count, distance, then a column for each variable. */
export function solutionsCsv(rows: readonly SolutionRow[]): string {
  const labels = Object.keys(rows[0]?.assignment ?? {})
  const cell = (text: string): string => (/[",\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text)
  const head = ['energy', 'count', 'distance', ...labels.map(cell)].join(',')
  const lines = rows.map(({ energy, count, distance, assignment }) =>
    [energy, count, distance, ...labels.map((label) => assignment[label])].join(','),
  )
  return [head, ...lines, ''].join('\n')
}
