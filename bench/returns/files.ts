import { writeFileSync, openSync, writeSync, closeSync } from 'node:fs'
import { gzipSync } from 'node:zlib'
import { writeBytes } from '../../shared/engine/formats/npy-array'
import { writeZip } from '../../shared/engine/formats/archive'

const ROWS_AT_ONCE = 256

/** The table with a header of qubit numbers, written a few rows at a time. */
function writeTable(path: string, qubits: readonly number[], spins: Int8Array): void {
  const file = openSync(path, 'w')
  writeSync(file, `${qubits.join(',')}\n`)
  const width = qubits.length
  const block = Buffer.alloc(3 * ROWS_AT_ONCE * width)
  for (let start = 0; start < spins.length; start += ROWS_AT_ONCE * width) {
    let at = 0
    for (let k = start; k < Math.min(spins.length, start + ROWS_AT_ONCE * width); k++) {
      if (spins[k]! < 0) block[at++] = 0x2d
      block[at++] = 0x31
      block[at++] = (k + 1) % width === 0 ? 0x0a : 0x2c
    }
    writeSync(file, block, 0, at)
  }
  closeSync(file)
}

/** Eight bytes a spin, as NumPy makes integers unless told otherwise. */
function wide(spins: Int8Array): Uint8Array {
  const values = new BigInt64Array(spins.length)
  spins.forEach((spin, k) => (values[k] = BigInt(spin)))
  return new Uint8Array(values.buffer)
}

export interface SamplesFile {
  name: string
  path: string
}

/** Writes the same rows in every format that is measured. */
export function writeFiles(folder: string, qubits: readonly number[], spins: Int8Array): SamplesFile[] {
  const path = (name: string): string => `${folder}/${name}`
  writeTable(path('samples.csv'), qubits, spins)
  const shape = [spins.length / qubits.length, qubits.length]
  const npy = writeBytes(spins, shape)
  writeFileSync(path('samples.npy'), npy)
  writeFileSync(path('samples.npy.gz'), gzipSync(npy, { level: 1 }))
  const head = Buffer.from(npy.subarray(0, npy.length - spins.length))
    .toString('latin1')
    .replace("'|i1'", "'<i8'")
  const long = Buffer.concat([Buffer.from(head, 'latin1'), wide(spins)])
  writeFileSync(path('samples.npz'), writeZip(new Map([['samples.npy', new Uint8Array(long)]])))
  return ['samples.csv', 'samples.npy', 'samples.npy.gz', 'samples.npz'].map((name) => ({ name, path: path(name) }))
}
