import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { applyDefects, normaliseDefects } from '../../../shared/engine/machine/defects'
import { buildFabric } from '../../../shared/engine/machine/build-fabric'
import { createMachineSchema } from '../../../shared/schemas/machines'
import type { MachineSheet } from '../../../shared/schemas/machines'
import { differenceCsv, SHEET_FIGURES, sheetDifference } from '../../../shared/sheet-difference'

const fabric = buildFabric({ kind: 'king', width: 4, height: 3 })
const { ids, graph } = fabric

function sheetOf(defects: { qubits: number[]; couplers: [number, number][] }, more: object = {}): MachineSheet {
  const { qubits, couplers } = normaliseDefects(fabric, defects)
  const {
    name: _,
    note: __,
    family: ___,
    ...sheet
  } = createMachineSchema.parse({
    name: 'Alder',
    family: { kind: 'king', width: 4, height: 3 },
    defects: { qubits, couplers },
    ...more,
  })
  return sheet
}

/** Working qubits and couplers by their names, from the machine that is left. */
function working(sheet: MachineSheet) {
  const left = applyDefects(fabric, sheet.defects)
  const ends = left.graph.ends
  const couplers = new Set<string>()
  for (let k = 0; k < ends.length; k += 2) couplers.add(`${ids[ends[k]!]}-${ids[ends[k + 1]!]}`)
  return { qubits: new Set(Array.from(ids).filter((_, q) => left.usable[q])), couplers }
}

const defects = fc.record({
  qubits: fc.uniqueArray(fc.constantFrom(...ids), { maxLength: 5 }),
  couplers: fc
    .uniqueArray(fc.nat(graph.ends.length / 2 - 1), { maxLength: 9 })
    .map((edges) =>
      edges.map((edge): [number, number] => [ids[graph.ends[2 * edge]!]!, ids[graph.ends[2 * edge + 1]!]!]),
    ),
})

describe('sheetDifference', () => {
  it('names exactly the parts that one machine has and the other has not, those of lost qubits aside', () => {
    fc.assert(
      fc.property(defects, defects, (a, b) => {
        const [before, now] = [sheetOf(a), sheetOf(b)]
        const [had, has] = [working(before), working(now)]
        const change = sheetDifference(before, now)
        expect(new Set(change.qubitsLost)).toEqual(new Set([...had.qubits].filter((q) => !has.qubits.has(q))))
        expect(new Set(change.qubitsRegained)).toEqual(new Set([...has.qubits].filter((q) => !had.qubits.has(q))))
        const onlyIn = (one: typeof had, other: typeof had) =>
          [...one.couplers].filter(
            (pair) => !other.couplers.has(pair) && pair.split('-').every((q) => other.qubits.has(Number(q))),
          )
        const names = (pairs: [number, number][]) => pairs.map(([q, r]) => `${q}-${r}`).sort()
        expect(names(change.couplersLost)).toEqual(onlyIn(had, has).sort())
        expect(names(change.couplersRegained)).toEqual(onlyIn(has, had).sort())
      }),
    )
  })

  it('is the other way round when the sides are', () => {
    fc.assert(
      fc.property(defects, defects, (a, b) => {
        const [there, back] = [sheetDifference(sheetOf(a), sheetOf(b)), sheetDifference(sheetOf(b), sheetOf(a))]
        expect([there.qubitsLost, there.couplersLost]).toEqual([back.qubitsRegained, back.couplersRegained])
      }),
    )
  })

  it('knows every figure of a sheet', () => {
    const paths = (value: unknown, path: string[] = []): string[] =>
      typeof value === 'object' && value !== null && !Array.isArray(value)
        ? Object.entries(value).flatMap(([key, inner]) => paths(inner, [...path, key]))
        : [path.join('.')]
    const {
      defects: _,
      energyTable: __,
      remark: ___,
      ...figures
    } = sheetOf({ qubits: [], couplers: [] }, { price: { perSecond: 1, currency: 'EUR' } })
    expect(SHEET_FIGURES.map(({ field }) => field).sort()).toEqual(paths(figures).sort())
  })

  it('tells how the energies moved', () => {
    const none = sheetOf({ qubits: [], couplers: [] })
    const table = (a: number) => ({ ...none, energyTable: { s: [0, 0.5, 1], A: [9, a, 0], B: [0, 5, 12] } })
    expect(sheetDifference(table(3), table(3)).energies).toBeNull()
    expect(sheetDifference(table(3), table(2)).energies).toEqual({
      kind: 'changed',
      A: { s: 0.5, from: 3, to: 2 },
      B: null,
    })
    expect(sheetDifference(none, table(2)).energies!.kind).toBe('given')
    expect(sheetDifference(table(2), none).energies!.kind).toBe('withdrawn')
  })
})

describe('differenceCsv', () => {
  it('has a line for each changed part and figure', () => {
    const before = sheetOf({ qubits: [ids[0]!], couplers: [] }, { temperatureMillikelvin: 13.1 })
    const now = sheetOf(
      { qubits: [ids[5]!], couplers: [[ids[2]!, ids[3]!]] },
      { ranges: { h: [-4, 3] }, energyTable: { s: [0, 1], A: [9, 0], B: [0, 12] } },
    )
    expect(differenceCsv(sheetDifference(before, now)).split('\n')).toEqual([
      'part,name,from,to,unit',
      `qubit,${ids[5]},working,missing,`,
      `qubit,${ids[0]},missing,working,`,
      `coupler,${ids[2]}-${ids[3]},working,missing,`,
      'figure,h,-1 to 1,-4 to 3,',
      'figure,Temperature,13.1,not measured,mK',
      'energy table,,none,given,',
      '',
    ])
  })
})
