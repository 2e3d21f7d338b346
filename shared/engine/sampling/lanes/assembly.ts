import type { KernelExports } from '../../assembly'
import { instantiate, PAGE } from '../../assembly'
import type { LaneModel, Lanes } from './lane-model'
import { LANES } from './lane-model'
import { BYTES as BYTES_16 } from './sweep-16-bytes'
import { BYTES as BYTES_32 } from './sweep-32-bytes'
import { factor32, sweep16, table16, table32 } from './thresholds'

interface SweepExports extends KernelExports {
  begin(n: number, words: number): void
  sweep(thresholds: number, factor: number, doublings?: number, bias?: number): void
}

/** Neighbours are taken two at once; odd numbers of them are filled up with a coupling of nothing to nobody. */
const AT_ONCE = 2
/** Bytes of a record: address and coupling. */
const RECORD = 8
/** Arrays start where no vector straddles two cache lines. */
const CACHE_LINE = 64

const evenDegree = ({ offsets }: LaneModel, k: number): number =>
  Math.ceil((offsets[k + 1]! - offsets[k]!) / AT_ONCE) * AT_ONCE

/** Where each array lies, in bytes, and the end of the last. */
function layOut(model: LaneModel, tableBytes: number) {
  const { n, levelStarts } = model
  const laneBytes = model.kind === '16-bit' ? 2 : 4
  let end = PAGE
  const place = (bytes: number): number => {
    const at = end
    end += Math.ceil(bytes / CACHE_LINE) * CACHE_LINE
    return at
  }
  let records = 0
  for (let k = 0; k < n; k++) records += evenDegree(model, k)
  const vector = laneBytes * LANES
  return {
    vector,
    addresses: place(CACHE_LINE),
    levelStarts: place(4 * levelStarts.length),
    recordStarts: place(4 * (n + 1)),
    // One more than spins: nobody, whom filling records point at.
    fields: place(vector * (n + 1)),
    spins: place(vector * n),
    changes: place(vector * n),
    changed: place(4 * n),
    state: place(8),
    words: place(2 * n),
    records: place(RECORD * records),
    thresholds: place(tableBytes),
    end,
  }
}
type Layout = ReturnType<typeof layOut>

/** Levels, addresses and the records of neighbours: everything that stays as it is. */
function writeModel(model: LaneModel, at: Layout, memory: ArrayBuffer): void {
  const { kind, n, levelStarts, offsets, targets, weights } = model
  const words = new Uint32Array(memory)
  const singles = new Float32Array(memory)
  words.set(levelStarts, at.levelStarts / 4)
  const { levelStarts: levels, recordStarts, fields, spins, changes, changed, state } = at
  const table = [levelStarts.length - 1, levels, recordStarts, fields, spins, changes, changed, state]
  words.set(table, at.addresses / 4)
  let record = at.records / 4
  const write = (target: number, weight: number): void => {
    words[record++] = fields + target * at.vector
    if (kind === '32-bit') singles[record++] = -2 * weight
    // Modulo 2¹⁶: the sum of field and change is in range, whatever the change alone would be.
    else words[record++] = Math.imul((-2 * weight) & 0xffff, 0x10001)
  }
  for (let k = 0; k < n; k++) {
    words[recordStarts / 4 + k] = 4 * record
    for (let p = offsets[k]!; p < offsets[k + 1]!; p++) write(targets[p]!, weights[p]!)
    for (let p = offsets[k + 1]! - offsets[k]!; p < evenDegree(model, k); p++) write(n, 0)
  }
  words[recordStarts / 4 + n] = 4 * record
}

/** The replicas on a WebAssembly kernel with 128-bit vectors; null where the platform has none. */
export function assemblyLanes(model: LaneModel): Lanes | null {
  const { kind, n, fieldsDown, scale } = model
  const table = kind === '16-bit' ? table16() : table32()
  const at = layOut(model, table.byteLength)
  const kernel = instantiate<SweepExports>(kind === '16-bit' ? BYTES_16 : BYTES_32, at.end - PAGE)
  if (!kernel) return null
  const memory = kernel.memory.buffer
  const view = kind === '16-bit' ? Int16Array : Float32Array
  const fields = new view(memory, at.fields, (n + 1) * LANES)
  const spins = new view(memory, at.spins, n * LANES)
  const state = new Int32Array(memory, at.state, 2)
  const words = new Uint16Array(memory, at.words, n)
  writeModel(model, at, memory)
  new view(memory, at.thresholds, table.length).set(table)
  kernel.bind(at.addresses)
  return {
    begin(up, x, y) {
      spins.fill(-1)
      fieldsDown.forEach((field, k) => fields.fill(field, k * LANES, (k + 1) * LANES))
      words.set(up)
      state.set([x, y])
      kernel.begin(n, at.words)
    },
    sweep(beta, index) {
      if (kind === '32-bit') return kernel.sweep(at.thresholds, factor32(beta, scale))
      const { factor, doublings, bias } = sweep16(beta, scale, index)
      kernel.sweep(at.thresholds, factor, doublings, bias)
    },
    spins: () =>
      Uint16Array.from({ length: n }, (_, k) => {
        let word = 0
        for (let lane = 0; lane < LANES; lane++) if (spins[k * LANES + lane]! > 0) word |= 1 << lane
        return word
      }),
  }
}
