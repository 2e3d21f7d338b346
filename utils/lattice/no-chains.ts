import type { ChainLayer } from './types'

/** A machine without an embedding. */
export const NO_CHAINS: ChainLayer = {
  labels: [],
  offsets: new Uint32Array(1),
  qubits: new Uint32Array(0),
  neighbours: new Uint32Array(0),
}
