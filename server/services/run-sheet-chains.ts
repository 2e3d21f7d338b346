import { pullsOf } from '../../shared/engine/programming/strength'
import { packArrays } from '../../shared/packed-arrays'
import type { Actor, App } from '../app'
import { couplerCountsOf } from './chain-couplers'
import { programmeShown } from './programming'
import { benchOf, runSheetRow } from './run-sheets'

/**
 * Every chain of a run sheet as columns, one entry a variable: what a `ChainRow` holds, with `splits` three numbers long
 * (up, down, cut); labels travel in the header. Packed, as a large problem has tens of thousands of chains.
 */
export async function packedChains(app: App, actor: Actor, id: string): Promise<Uint8Array<ArrayBuffer>> {
  const row = await runSheetRow(app, actor, id)
  const bench = await benchOf(app, actor, row)
  const { layout, strengths, bounds } = programmeShown(bench, row.settings)
  return packArrays(
    {
      qubits: layout.chainLength,
      couplers: couplerCountsOf(bench),
      strength: strengths,
      cutBound: bounds.bound,
      exact: bounds.exact,
      splits: Float64Array.from(bounds.splits.flatMap(({ up, down, cut }) => [up, down, cut])),
      pull: pullsOf(bench.ising),
      field: bench.ising.linear,
    },
    { labels: bench.labels },
  )
}
