import { describe, expect, it } from 'vitest'
import { readGraphFile } from '../../../../../shared/engine/machine/graph-files/read-graph-file'
import type { WrittenFormat } from '../../../../../shared/engine/machine/graph-files/write-graph-file'
import { writeGraphFile } from '../../../../../shared/engine/machine/graph-files/write-graph-file'

/** Qubits 2, 3, 7 and 9, of which 3 is missing; 2-7 and 7-9 work. */
const PARTS = {
  ids: Uint32Array.of(2, 3, 7, 9),
  segments: Float32Array.of(0, 0, 0, 3, 1, 0, 1, 1, 2, 2.5, 4, 2.5, 5, 5, 5, 5),
  usable: Uint8Array.of(1, 0, 1, 1),
  ends: Uint32Array.of(0, 2, 2, 3),
}

describe('writeGraphFile', () => {
  it('writes JSON with every working qubit in the middle of its segment', () => {
    expect(JSON.parse(writeGraphFile(PARTS, 'json'))).toEqual({
      nodes: [2, 7, 9],
      edges: [
        [2, 7],
        [7, 9],
      ],
      positions: [
        [0, 1.5],
        [3, 2.5],
        [5, 5],
      ],
    })
  })

  it('writes a row a coupler', () => {
    expect(writeGraphFile(PARTS, 'csv')).toBe('a,b\n2,7\n7,9\n')
  })

  it('writes Matrix Market with numbers from 1, the larger first', () => {
    const [banner, ...rest] = writeGraphFile(PARTS, 'mtx').split('\n')
    expect(banner).toBe('%%MatrixMarket matrix coordinate pattern symmetric')
    expect(rest.filter((line) => !line.startsWith('%'))).toEqual(['10 10 2', '8 3', '10 8', ''])
  })

  it.each<WrittenFormat>(['json', 'csv', 'mtx'])('is read back: %s', (format) => {
    const { graph, issues } = readGraphFile(new TextEncoder().encode(writeGraphFile(PARTS, format)))
    expect(issues).toEqual([])
    const { ids, ends } = graph!
    expect(Array.from(ends, (q) => ids[q])).toEqual([2, 7, 7, 9])
  })

  it('writes a machine without couplers, and one without qubits', () => {
    const bare = { ...PARTS, ends: new Uint32Array() }
    expect(JSON.parse(writeGraphFile(bare, 'json'))).toMatchObject({ nodes: [2, 7, 9], edges: [] })
    const none = { ...bare, usable: new Uint8Array(4) }
    expect(JSON.parse(writeGraphFile(none, 'json'))).toEqual({ nodes: [], edges: [], positions: [] })
  })
})
