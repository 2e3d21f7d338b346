import type { ChainRow } from '#shared/schemas/run-sheets'
import type { Unpacked } from '#shared/packed-arrays'

/** The chains of a run sheet as the server packs them, row by row. */
export function unpackChainRows({ meta, arrays }: Unpacked): ChainRow[] {
  const { qubits, couplers, strength, cutBound, exact, splits, pull, field } = arrays
  return (meta.labels as string[]).map((label, variable) => ({
    variable,
    label,
    qubits: qubits![variable]!,
    couplers: couplers![variable]!,
    strength: strength![variable]!,
    cutBound: cutBound![variable]!,
    cutBoundExact: exact![variable] === 1,
    cutSplit:
      qubits![variable]! > 1
        ? { up: splits![3 * variable]!, down: splits![3 * variable + 1]!, cut: splits![3 * variable + 2]! }
        : null,
    pull: pull![variable]!,
    field: field![variable]!,
  }))
}

/** Only chains of two and more qubits have a coupler that a strength could stand on. */
export const isBreakable = ({ qubits }: Pick<ChainRow, 'qubits'>): boolean => qubits > 1
