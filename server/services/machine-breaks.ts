import type { JudgedPart } from '../../shared/engine/readout/suspects'
import type { PartBreaks } from '../../shared/engine/readout/part-breaks'
import type { MachineBreaks, PartRate } from '../../shared/schemas/machine-use'
import type { Actor, App } from '../app'
import { keepBreaks, returnsAt } from '../database/repositories/machine-use'
import { packBreaks, unpackBreaks } from './breaks-data'
import type { CalibratedMachine } from './machine-graphs'
import { calibratedMachine } from './machine-graphs'
import { loadBench, programmeBench, requireProgrammed } from './programming'
import { proportion } from './proportion'
import { summaryOf } from './return-summary'

/** Returns that are summed up, the newest. */
const MOST_RETURNS = 500

type ReturnAt = Awaited<ReturnType<typeof returnsAt>>[number]

/** Counts the breaks of a return and keeps the counts with it, unless somebody else did so meanwhile. */
async function countedBreaks(app: App, { row, embedding }: ReturnAt): Promise<PartBreaks> {
  const bench = await loadBench(app, embedding)
  const programmed = requireProgrammed(programmeBench(bench, row.settings))
  const summary = await summaryOf(app, row, { programmed, ising: bench.ising })
  const breaks = await app.compute.run('countPartBreaks', { breaks: summary.breaks, programmed })
  const blobId = await app.blobs.write(packBreaks(breaks, bench.machine.fabric.ids))
  await app.db.transaction(async (tx) => {
    if (await keepBreaks(tx, row.id, blobId)) await app.blobs.adopt(tx, blobId)
  })
  return breaks
}

async function breaksOf(app: App, machine: CalibratedMachine, one: ReturnAt): Promise<PartBreaks> {
  const { breaksBlobId } = one.row
  return breaksBlobId ? unpackBreaks(await app.blobs.read(breaksBlobId), machine.indexOf) : countedBreaks(app, one)
}

const rateOf = ({ count, total, ...judged }: JudgedPart): PartRate => ({ ...proportion(count, total), ...judged })

/**
 * Breaks of every qubit and coupler of a machine over the returns of the embeddings made at a calibration. Rehearsals are
 * counted only when asked for: they tell of the settings, not of the machine.
 */
export async function machineBreaks(
  app: App,
  actor: Actor,
  id: string,
  { calibration: number, rehearsals }: { calibration?: number; rehearsals: boolean },
): Promise<MachineBreaks> {
  const machine = await calibratedMachine(app, actor, id, number)
  const calibration = machine.calibration.number
  const all = await returnsAt(app.db, id, calibration, rehearsals ? ['upload', 'rehearsal'] : ['upload'])
  const rows = all.slice(0, MOST_RETURNS)
  const embeddings = [...new Set(rows.map(({ embedding }) => embedding.id))]
  const returns: (PartBreaks & { embedding: number })[] = []
  for (const one of rows)
    returns.push({ ...(await breaksOf(app, machine, one)), embedding: embeddings.indexOf(one.embedding.id) })
  const { graph, fabric } = machine
  const judged = await app.compute.run('judgeBreaks', { graph, segments: fabric.segments, returns })
  const { qubits, couplers } = judged
  const idOf = (q: number): number => fabric.ids[q]!
  return {
    calibration,
    rehearsals,
    returns: rows.map(({ row, embedding, runSheet }) => ({
      id: row.id,
      number: row.number,
      source: row.source,
      runSheet,
      embedding: { id: embedding.id, number: embedding.number },
      reads: row.reads,
    })),
    leftOut: all.length - rows.length,
    embeddings: embeddings.length,
    reads: judged.reads,
    qubits: qubits.parts.map((part, k) => ({ id: idOf(qubits.qubit[k]!), ...rateOf(part) })),
    couplers: couplers.parts.map((part, k) => ({
      a: idOf(couplers.ends[2 * k]!),
      b: idOf(couplers.ends[2 * k + 1]!),
      ...rateOf(part),
    })),
    judged: {
      qubits: { tested: qubits.tested, spread: qubits.spread },
      couplers: { tested: couplers.tested, spread: couplers.spread },
    },
  }
}

/** One line a part: numbers of its qubits (one for a qubit), counts, rate, interval, neighbours. */
export function breaksCsv({ qubits, couplers }: MachineBreaks): string {
  const line = (part: string, a: number, b: number | '', rate: PartRate): string =>
    [
      part,
      a,
      b,
      rate.count,
      rate.total,
      rate.rate,
      rate.low,
      rate.high,
      rate.neighbours,
      rate.neighbourRate ?? '',
      rate.ratio ?? '',
      rate.q ?? '',
      rate.suspect ? 'yes' : 'no',
    ].join(',')
  return [
    'part,a,b,broken reads,reads,rate,low,high,neighbours,neighbours rate,ratio,q,suspect',
    ...qubits.map((row) => line('qubit', row.id, '', row)),
    ...couplers.map((row) => line('coupler', row.a, row.b, row)),
    '',
  ].join('\n')
}
