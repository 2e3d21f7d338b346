import { describe, expect, it } from 'vitest'
import { crossingsOf } from '../../../../../shared/engine/embedding/lines/crossings'
import { edgeBetween } from '../../../../../shared/engine/graph/build'
import { createRandom } from '../../../../../shared/engine/random'
import { completeGraph, kingGraph } from '../../../../fixtures/graphs'
import { SMALL_FAMILIES, taskOn } from './machines'

const isVertical = (segments: Float32Array, q: number): boolean => segments[4 * q] === segments[4 * q + 2]

describe('crossingsOf', () => {
  it('has every coupler between crossing qubits once on either side, and none that is missing', () => {
    const random = createRandom(61)
    for (const family of SMALL_FAMILIES) {
      const { machine, usable, segments } = taskOn(family, completeGraph(2), 0.05, random)
      const { counts, place, rows, slotOf, first, qubits } = crossingsOf(machine, usable, segments)!
      let found = 0
      for (let x = 0; x < counts[0]; x++)
        for (let y = 0; y < counts[1]; y++) {
          const down = place[rows[0] + x * counts[1] + y]!
          const along = place[rows[1] + y * counts[0] + x]!
          expect(down < 0).toBe(along < 0)
          if (down < 0) continue
          found++
          const q = qubits[slotOf[first[0] + x]! + down]!
          const r = qubits[slotOf[first[1] + y]! + along]!
          expect([isVertical(segments!, q), isVertical(segments!, r)]).toEqual([true, false])
          expect(edgeBetween(machine, q, r)).toBeGreaterThanOrEqual(0)
        }
      let internal = 0
      for (let k = 0; k < machine.ends.length; k += 2)
        if (isVertical(segments!, machine.ends[k]!) !== isVertical(segments!, machine.ends[k + 1]!)) internal++
      expect(found).toBe(internal)
    }
  })

  it('knows lines that are alike: the t lines of a column or row of Chimera cells', () => {
    const { machine, usable, segments } = taskOn(SMALL_FAMILIES[0]!, completeGraph(2), 0, createRandom(62))
    const { alikeFrom, alikeTo } = crossingsOf(machine, usable, segments)!
    const cells = [...Array.from({ length: 12 }, (_, x) => x), ...Array.from({ length: 16 }, (_, y) => y)]
    expect([...alikeFrom]).toEqual(cells.map((line) => line - (line % 4)))
    expect([...alikeTo]).toEqual(cells.map((line) => line - (line % 4) + 4))
  })

  it('counts the missing couplers along each line', () => {
    const { machine, usable, segments } = taskOn(SMALL_FAMILIES[4]!, completeGraph(2), 0.1, createRandom(63))
    const { counts, gaps, slotOf, qubits, broken } = crossingsOf(machine, usable, segments)!
    expect([...broken]).toEqual(Array.from(qubits, (q) => 1 - usable[q]!))
    for (let line = 0; line < counts[0] + counts[1]; line++) {
      const end = line + 1 < slotOf.length ? slotOf[line + 1]! : qubits.length
      let missing = 0
      for (let slot = slotOf[line]!; slot < end; slot++) {
        const [before, q] = [qubits[slot - 1]!, qubits[slot]!]
        if (slot > slotOf[line]! && usable[before] && usable[q] && edgeBetween(machine, before, q) < 0) missing++
        expect(gaps[slot]).toBe(missing)
      }
    }
  })

  it('is null without segments, for points, and where all lines run the same way', () => {
    const king = kingGraph(3, 3)
    const all = new Uint8Array(9).fill(1)
    const points = Float32Array.from({ length: 36 }, (_, i) => Math.floor(i / 4) * 2 + (i % 2))
    const parallel = Float32Array.from({ length: 36 }, (_, i) => [Math.floor(i / 4), 0, Math.floor(i / 4), 1][i % 4]!)
    for (const segments of [null, points, parallel]) expect(crossingsOf(king, all, segments)).toBeNull()
  })
})
