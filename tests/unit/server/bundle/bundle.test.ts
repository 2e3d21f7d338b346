import { unzipSync } from 'fflate'
import { describe, expect, it } from 'vitest'
import type { BundleInput } from '../../../../server/bundle/input'
import { writeBundle } from '../../../../server/workers/tasks/write-bundle'
import { buildFabric } from '../../../../shared/engine/machine/build-fabric'
import { machineTimeEstimate } from '../../../../shared/engine/programming/machine-time'
import { createRandom } from '../../../../shared/engine/random'
import { createMachineSchema } from '../../../../shared/schemas/machines'
import { runSheetSettingsSchema } from '../../../../shared/schemas/run-sheets'

const control = { shouldStop: () => false, report: () => {} } as never

/** A machine of which every qubit and coupler is used, with real values: the largest bundle it can give. */
function fullMachine(m: number, gauges: number): BundleInput {
  const fabric = buildFabric({ kind: 'pegasus', m, trimmed: true })
  const n = fabric.ids.length
  const random = createRandom(3)
  const couplers = fabric.graph.ends.length / 2
  const draw = (length: number) => Float64Array.from({ length }, () => 2 * random.float() - 1)
  const [h, J] = [draw(n), draw(couplers)]
  const ends = Uint32Array.from(fabric.graph.ends)
  const order = Uint32Array.from({ length: n }, (_, k) => k)
  const settings = runSheetSettingsSchema.parse({ gauges, reads: 10 * gauges })
  const timing = { programMicroseconds: 1, readoutMicroseconds: 1, delayMicroseconds: 0 }
  const { defects: _, ...sheet } = createMachineSchema.parse({ name: 'Full', family: { kind: 'pegasus', m } })
  return {
    sheet: { number: 7, name: 'All of it', settings },
    problem: { number: 1, version: 1, sense: 'min' },
    labels: Array.from(order, (k) => `v${k}`),
    ising: {
      n,
      linear: h.slice(),
      rows: ends.filter((_end, k) => k % 2 === 0),
      cols: ends.filter((_end, k) => k % 2 === 1),
      values: J,
      offset: 0.5,
    },
    embedding: { number: 1 },
    chains: Array.from(fabric.ids, (id) => [id]),
    machine: {
      name: 'Full',
      family: fabric.family,
      calibration: 1,
      sheet: { ...sheet, defects: { qubits: [], couplers: [] } },
    },
    programmed: {
      qubits: order,
      h,
      ends,
      J,
      isChainCoupler: new Uint8Array(couplers),
      scale: 1,
      offset: 0.5,
      limitedBy: 'nothing',
      chainStrength: new Float64Array(n).fill(1),
      chainOf: order,
    },
    qubitIds: Array.from(fabric.ids),
    fingerprints: { problem: 'a', embedding: 'b', programmed: 'c' },
    estimate: machineTimeEstimate({ gauges, reads: 10 * gauges, annealMicroseconds: 20, timing }),
  }
}

describe('the bundle of a whole machine', () => {
  it('stays below 6 MiB with 5640 qubits, 40484 couplers and 1000 gauges', () => {
    const input = fullMachine(16, 1000)
    expect([input.qubitIds.length, input.programmed.J.length]).toEqual([5640, 40_484])
    const { bytes } = writeBundle(input, control)
    expect(bytes.length).toBeLessThan(6 * 2 ** 20)
    const gauges = new TextDecoder().decode(unzipSync(bytes)['RS-7/gauges.csv']).trimEnd().split('\n')
    expect(gauges).toHaveLength(1001)
    expect(new Set(gauges.slice(1).map((line) => line.split(',')[2]!.length))).toEqual(new Set([5640]))
  })

  it('gives the same bytes wherever and whenever it is written', () => {
    const zone = process.env.TZ
    const first = writeBundle(fullMachine(2, 3), control).bytes
    process.env.TZ = 'Pacific/Auckland'
    const second = writeBundle(fullMachine(2, 3), control).bytes
    process.env.TZ = zone
    expect(Buffer.compare(first, second)).toBe(0)
  })

  it('holds other numbers where one field changes', () => {
    const [one, other] = [fullMachine(2, 1), fullMachine(2, 1)]
    other.programmed.h[0] = 0.125
    const sums = (input: BundleInput) =>
      new TextDecoder().decode(unzipSync(writeBundle(input, control).bytes)['RS-7/SHA256SUMS']).split('\n')
    const changed = sums(one).filter((line, k) => line !== sums(other)[k])
    expect(changed.map((line) => line.split('  ')[1])).toEqual([
      'README.txt',
      'problem.csv',
      'problem.json',
      'problem.mtx',
    ])
  })
})
