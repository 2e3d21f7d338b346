import type { Programmed } from '../../shared/engine/programming/programme'
import type { CalibratedMachine } from './machine-graphs'

/** Published qubit number of every position of a programmed problem. */
export const qubitIdsOf = (
  { machine: { fabric } }: { machine: Pick<CalibratedMachine, 'fabric'> },
  { qubits }: Programmed,
): number[] => Array.from(qubits, (q) => fabric.ids[q]!)
