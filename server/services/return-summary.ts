import type { DecodeMethod } from '../../shared/engine/readout/decode'
import type { PackedArray } from '../../shared/packed-arrays'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'
import type { App } from '../app'
import type { Db } from '../database/client'
import type { ReturnRow } from '../database/repositories/run-sheets'
import { keepSummary } from '../database/repositories/run-sheets'
import type { DecodedRows, Summary, SummariseInput } from '../workers/tasks/summarise'
import { signed, signOf } from './sense'
import { unpackSamples } from './samples-data'

/** Figures of a return that lists show. */
export interface ReturnFigures {
  readsWithBreak: number
  /** Best majority-decoded energy in the problem's own sense. */
  best: number
}

/** A summary in the store, which no return refers to yet. */
export interface WrittenSummary {
  blobId: string
  figures: ReturnFigures
}

interface Meta {
  reads: number
  readsWithBreak: number
  chainReads: number
  histogram: number[]
  decoded: { method: DecodeMethod; ties: number; width: number; rows: number }[]
}

function packSummary({ breaks, physical, decoded }: Summary): Uint8Array {
  const { reads, readsWithBreak, chainReads, perChain, perRead, perCoupler, perQubit } = breaks
  const arrays: Record<string, PackedArray> = {
    physical,
    perCoupler,
    perQubit,
    perChain: perChain.breaks,
    perRead: perRead.brokenChains,
  }
  decoded.forEach(({ states, kept, energies }, k) => {
    Object.assign(arrays, {
      [`states${k}`]: states.bytes,
      [`counts${k}`]: states.counts,
      [`kept${k}`]: kept,
      [`energies${k}`]: energies,
    })
  })
  const meta: Meta = {
    reads,
    readsWithBreak,
    chainReads,
    histogram: perRead.histogram,
    decoded: decoded.map(({ method, ties, states: { width, rows } }) => ({ method, ties, width, rows })),
  }
  return packArrays(arrays, { ...meta })
}

function unpackSummary(packed: Uint8Array): Summary {
  const { meta, arrays } = unpackArrays(packed)
  const { reads, readsWithBreak, chainReads, histogram, decoded } = meta as unknown as Meta
  const whole = (name: string): Uint32Array => arrays[name] as Uint32Array
  return {
    breaks: {
      reads,
      readsWithBreak,
      chainReads,
      perChain: { breaks: whole('perChain') },
      perRead: { brokenChains: arrays.perRead as Uint16Array, histogram },
      perCoupler: whole('perCoupler'),
      perQubit: whole('perQubit'),
    },
    physical: arrays.physical as Float64Array,
    decoded: decoded.map(({ method, ties, width, rows }, k) => ({
      method,
      ties,
      states: { width, rows, bytes: arrays[`states${k}`] as Uint8Array, counts: whole(`counts${k}`) },
      kept: whole(`kept${k}`),
      energies: arrays[`energies${k}`] as Float64Array,
    })),
  }
}

export const decodedBy = ({ decoded }: Summary, method: DecodeMethod): DecodedRows =>
  decoded.find((rows) => rows.method === method)!

/** Sums samples up, over the threads. */
async function summarise(app: App, input: SummariseInput): Promise<Summary> {
  const { samples, programmed } = input
  // The longest first: descent takes more than all the others together.
  const [descent, majority, discard, counted] = await Promise.all([
    app.compute.run('decodeRows', { ...input, method: 'descent' }),
    app.compute.run('decodeRows', { ...input, method: 'majority' }),
    app.compute.run('decodeRows', { ...input, method: 'discard' }),
    app.compute.run('countBreaks', { samples, programmed }),
  ])
  return { ...counted, decoded: [majority, discard, descent] }
}

/** Sums samples up and writes what came of it, for the return that they become. */
export async function writeSummary(app: App, input: SummariseInput, sense: 'min' | 'max'): Promise<WrittenSummary> {
  const summary = await summarise(app, input)
  const best = decodedBy(summary, 'majority').energies.reduce((least, energy) => Math.min(least, energy), Infinity)
  return {
    blobId: await app.blobs.write(packSummary(summary)),
    figures: { readsWithBreak: summary.breaks.readsWithBreak, best: signed(signOf(sense), best) },
  }
}

/** The summary of a return that has one, without what it was made from. */
export async function readSummary(app: App, summaryBlobId: string): Promise<Summary> {
  return unpackSummary(await app.blobs.read(summaryBlobId))
}

/** What a ready return holds, as it was summed up once; the input without the samples, which are looked up where needed. */
export async function summaryOf(
  app: App,
  row: ReturnRow,
  input: Omit<SummariseInput, 'samples' | 'seed'>,
): Promise<Summary> {
  if (row.summaryBlobId) return readSummary(app, row.summaryBlobId)
  const samples = unpackSamples(await app.blobs.read(row.samplesBlobId!))
  const summary = await summarise(app, { ...input, samples, seed: row.settings.seed })
  const blobId = await app.blobs.write(packSummary(summary))
  await app.db.transaction(async (tx: Db) => {
    if (await keepSummary(tx, row.id, blobId)) await app.blobs.adopt(tx, blobId)
  })
  return summary
}
