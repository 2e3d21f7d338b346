import type { SheetDifference } from '#shared/sheet-difference'
import type { LatticeData, MarkLayer } from '../lattice/types'

export type ChangedParts = Pick<SheetDifference, 'qubitsLost' | 'qubitsRegained' | 'couplersLost' | 'couplersRegained'>

/** Parts lost and regained as the lattice points them out; null where there are none. */
export function changeMarks(
  { ids }: Pick<LatticeData, 'ids'>,
  change: ChangedParts,
  words: { lost: string; regained: string },
): MarkLayer | null {
  const { qubitsLost, qubitsRegained, couplersLost, couplersRegained } = change
  if (qubitsLost.length + qubitsRegained.length + couplersLost.length + couplersRegained.length === 0) return null
  const indices = new Map(Array.from(ids, (id, q) => [id, q]))
  const indexed = (parts: readonly number[]) => Uint32Array.from(parts.flatMap((id) => indices.get(id) ?? []))
  const paired = (pairs: readonly (readonly [number, number])[]) =>
    indexed(pairs.filter((pair) => pair.every((id) => indices.has(id))).flat())
  return {
    qubits: indexed(qubitsLost),
    couplers: paired(couplersLost),
    words: words.lost,
    regained: { qubits: indexed(qubitsRegained), couplers: paired(couplersRegained), words: words.regained },
  }
}
