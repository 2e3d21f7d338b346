import type { MachineBreaks, MachineCouplerBreaks, PartRate, QubitBreaks } from '#shared/schemas/machine-use'
import type { HelpCase } from '../help/registry'
import type { HeatLayer, LatticeData } from '../lattice/types'
import { HEAT_BOUNDS } from '../lattice/scene-heat'
import { formatCount, formatNumber, formatPercent } from '../format'

/** A qubit or a coupler in the ranked table. */
export interface PartRow extends PartRate {
  /** As it is typed among missing parts: `17` or `17-42`. */
  readonly key: string
  readonly name: string
  /** Published numbers of its qubits. */
  readonly ids: readonly number[]
}

const qubitRow = (row: QubitBreaks): PartRow => ({ ...row, key: `${row.id}`, name: `${row.id}`, ids: [row.id] })
const couplerRow = (row: MachineCouplerBreaks): PartRow => ({
  ...row,
  key: `${row.a}-${row.b}`,
  name: `${row.a}–${row.b}`,
  ids: [row.a, row.b],
})

export type PartKind = 'couplers' | 'qubits'

export const rowsOf = (breaks: MachineBreaks, kind: PartKind): PartRow[] =>
  kind === 'couplers' ? breaks.couplers.map(couplerRow) : breaks.qubits.map(qubitRow)

export const suspectsOf = (breaks: MachineBreaks): { kind: PartKind; row: PartRow }[] =>
  (['couplers', 'qubits'] as const).flatMap((kind) =>
    rowsOf(breaks, kind)
      .filter(({ suspect }) => suspect)
      .sort((a, b) => (a.q ?? 1) - (b.q ?? 1))
      .map((row) => ({ kind, row })),
  )

/** A small q in words: `below 0.000001` rather than fifteen noughts. */
export const qText = (q: number): string => (q < 1e-6 ? 'below 0.000001' : formatNumber(q, { significant: 2 }))

/** `breaks 2.3 times as often as its neighbours (12 % of 3 000 reads against 5 %, q = 0.001)`. */
export function suspicionOf({ rate, total, neighbourRate, ratio, q }: PartRow): string {
  const often =
    ratio === null
      ? 'breaks while its neighbours never did'
      : `breaks ${formatNumber(ratio, { significant: 2 })} times as often as its neighbours`
  const [own, other] = [rate, neighbourRate ?? 0].map((share) => formatPercent(share, { significant: 2 }))
  return `${often} (${own} of ${formatCount(total, 'read')} against ${other}, q ${q! < 1e-6 ? '' : '= '}${qText(q!)})`
}

/** Classes of rate for the legend, from never to often. */
export const heatWords: readonly string[] = [
  'never',
  ...HEAT_BOUNDS.slice(1).map((bound, k) => (k === 0 ? `up to ${formatPercent(bound)}` : `to ${formatPercent(bound)}`)),
  `over ${formatPercent(HEAT_BOUNDS.at(-1)!)}`,
]

/** The rates for the lattice, palest first so that what breaks often lies above. */
export function heatLayerOf(breaks: MachineBreaks, data: Pick<LatticeData, 'ids' | 'ends'>): HeatLayer {
  const indexOf = new Map(Array.from(data.ids, (id, q) => [id, q]))
  const couplerOf = new Map<string, number>()
  for (let c = 0; 2 * c < data.ends.length; c++) couplerOf.set(`${data.ends[2 * c]}-${data.ends[2 * c + 1]}`, c)
  const placed = <T extends PartRate>(rows: readonly T[], place: (row: T) => number | undefined) =>
    rows
      .flatMap((row) => {
        const at = place(row)
        return at === undefined ? [] : [{ at, rate: row.rate }]
      })
      .sort((a, b) => a.rate - b.rate)
  const qubits = placed(breaks.qubits, ({ id }) => indexOf.get(id))
  const couplers = placed(breaks.couplers, ({ a, b }) => couplerOf.get(`${indexOf.get(a)}-${indexOf.get(b)}`))
  return {
    qubits: Uint32Array.from(qubits, ({ at }) => at),
    qubitRates: Float64Array.from(qubits, ({ rate }) => rate),
    couplers: Uint32Array.from(couplers, ({ at }) => at),
    couplerRates: Float64Array.from(couplers, ({ rate }) => rate),
  }
}

const nameOf = (kind: PartKind, { name }: PartRow): string => `${kind === 'couplers' ? 'coupler' : 'qubit'} ${name}`

export const rateCases = (rows: readonly PartRow[], kind: PartKind, rehearsal: boolean): HelpCase[] =>
  rows.map((row) => ({
    label: nameOf(kind, row),
    help: {
      id: 'rate',
      given: {
        count: row.count,
        total: row.total,
        counted:
          kind === 'couplers'
            ? 'reads in which its ends disagreed'
            : 'reads in which it was on the lesser side of its chain',
        of: 'reads',
        format: { significant: 3 },
        rehearsal,
      },
    },
  }))

export const ratioCases = (
  rows: readonly PartRow[],
  kind: PartKind,
  { judged, rehearsals }: MachineBreaks,
): HelpCase[] =>
  rows.flatMap((row) =>
    row.neighbourRate === null || row.q === null
      ? []
      : [
          {
            label: nameOf(kind, row),
            help: {
              id: 'partRatio',
              given: {
                neighbours: row.neighbours,
                neighbourRate: row.neighbourRate,
                ratio: row.ratio,
                q: row.q,
                ...judged[kind],
                rehearsal: rehearsals,
              },
            },
          },
        ],
  )
