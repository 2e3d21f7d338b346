import { layoutOfMachine } from '../graph/layout/machine'
import type { EmbeddingTask } from './task'

/** Where the qubits lie: as given, else a drawing of the machine graph that brings coupled qubits near each other. */
export const positionsOf = ({ segments, machine, usable }: EmbeddingTask): Float32Array =>
  segments ?? layoutOfMachine(machine, usable)
