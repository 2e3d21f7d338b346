import type { ReturnView } from '#shared/schemas/returns'
import type { ChainRow, ProgrammedView, RunSheetView } from '#shared/schemas/run-sheets'
import type { MachineSheet } from '#shared/schemas/machines'
import type { BreakLayer, ChainLayer, LatticeData, LedgerRow, LoadLayer } from '../lattice/types'

/** The chains of an embedding by dense index, with what the ledger shows of them. */
export interface EmbeddingChains extends ChainLayer {
  /** Per variable, couplers to the chains it interacts with. */
  readonly couplers: Uint32Array
  /** Ranges of the machine at the embedding's calibration. */
  readonly ranges: MachineSheet['ranges']
}

/** What a run sheet on the embedding says about its chains. */
export interface ChainFindings {
  readonly runSheet: RunSheetView
  /** Strength and bound of each chain by that run sheet. */
  readonly chains: readonly ChainRow[]
  /** The newest samples of that run sheet, if there are any. */
  readonly samples: ReturnView | null
  /** Null where the settings cannot be programmed. */
  readonly programmed: ProgrammedView | null
}

/** Load of one qubit: the sum of its programmed J as a share of the range on the side where it lies. */
const shareOf = (sum: number, [low, high]: readonly [number, number]): number => (sum < 0 ? sum / low : sum / high)

function indexOfIds(ids: Uint32Array): Map<number, number> {
  return new Map(Array.from(ids, (id, q) => [id, q]))
}

/** Coupling sums of all qubits over the machine's range; null where the machine bounds no sum. */
export function loadLayer(
  lattice: Pick<LatticeData, 'ids'>,
  programmed: ProgrammedView,
  ranges: MachineSheet['ranges'],
): LoadLayer | null {
  const bounds = ranges.couplingSum
  if (!bounds) return null
  const index = indexOfIds(lattice.ids)
  const sums = new Float64Array(lattice.ids.length)
  for (const [a, b, value] of programmed.J) {
    sums[index.get(a)!]! += value
    sums[index.get(b)!]! += value
  }
  return { qubitLoad: Float32Array.from(sums, (sum) => shareOf(sum, bounds)) }
}

/** Break rates by chain, and by coupler index of the lattice. */
export function breakLayer(lattice: Pick<LatticeData, 'ids' | 'ends'>, samples: ReturnView): BreakLayer | null {
  if (!samples.breaks) return null
  const { chains, couplers } = samples.breaks
  const chainRate = new Float64Array(chains.length)
  for (const { variable, rate } of chains) chainRate[variable] = rate
  const index = indexOfIds(lattice.ids)
  const key = (a: number, b: number): number => Math.min(a, b) * lattice.ids.length + Math.max(a, b)
  const rates = new Map(couplers.map(({ a, b, rate }) => [key(index.get(a)!, index.get(b)!), rate]))
  const couplerRate = new Map<number, number>()
  for (let k = 0; 2 * k < lattice.ends.length; k++) {
    const rate = rates.get(key(lattice.ends[2 * k]!, lattice.ends[2 * k + 1]!))
    if (rate !== undefined) couplerRate.set(k, rate)
  }
  return { chainRate, couplerRate, reads: samples.reads }
}

/** Largest programmed values on each chain, and its fullest coupling sum. */
function chainLoads(lattice: Pick<LatticeData, 'ids'>, chains: EmbeddingChains, programmed: ProgrammedView) {
  const load = loadLayer(lattice, programmed, chains.ranges)
  const largest = new Map<number, number>()
  const note = (qubit: number, value: number): void => {
    if (Math.abs(value) > Math.abs(largest.get(qubit) ?? 0)) largest.set(qubit, value)
  }
  for (const [a, b, value] of programmed.J) {
    note(a, value)
    note(b, value)
  }
  return chains.labels.map((_, i) => {
    const own = chains.qubits.subarray(chains.offsets[i], chains.offsets[i + 1])
    const figures = { field: 0, coupling: 0, sum: 0 }
    for (const q of own) {
      const id = lattice.ids[q]!
      figures.field = Math.max(figures.field, Math.abs(programmed.h[id] ?? 0))
      const coupling = largest.get(id) ?? 0
      if (Math.abs(coupling) > Math.abs(figures.coupling)) figures.coupling = coupling
      figures.sum = Math.max(figures.sum, load?.qubitLoad[q] ?? 0)
    }
    return figures
  })
}

/** The chain ledger: lengths and couplers always, the rest as far as a run sheet and samples tell it. */
export function ledgerRows(
  lattice: Pick<LatticeData, 'ids'>,
  chains: EmbeddingChains,
  findings: ChainFindings | null,
): LedgerRow[] {
  const strengths = new Map(findings?.chains.map((row) => [row.variable, row]))
  const breaks = new Map(findings?.samples?.breaks?.chains.map((row) => [row.variable, row]))
  const canShowLoad = findings?.programmed && chains.ranges.couplingSum
  const loads = canShowLoad ? chainLoads(lattice, chains, findings.programmed!) : null
  return chains.labels.map((label, variable) => {
    const broke = breaks.get(variable)
    const held = strengths.get(variable)
    const qubits = chains.offsets[variable + 1]! - chains.offsets[variable]!
    // A single qubit has no coupler to be held by: neither a strength nor a bound means anything.
    const isHeld = qubits > 1
    return {
      variable,
      label,
      qubits,
      couplers: chains.couplers[variable]!,
      // Samples keep the strength they were taken with, even after the sheet was changed.
      strength: isHeld ? (broke?.strength ?? held?.strength ?? null) : null,
      bound: isHeld ? (broke?.cutBound ?? held?.cutBound ?? null) : null,
      boundExact: held?.cutBoundExact,
      breaks: broke && { rate: broke.rate, low: broke.low, high: broke.high, count: broke.count, reads: broke.total },
      load: loads?.[variable] ?? null,
    }
  })
}
