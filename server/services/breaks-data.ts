import type { PartBreaks } from '../../shared/engine/readout/part-breaks'
import { packArrays, unpackArrays } from '../../shared/packed-arrays'

/** Breaks of a return by published numbers, which mean the same however the machine is built. */
export function packBreaks({ reads, qubits, couplers }: PartBreaks, ids: Uint32Array): Uint8Array {
  const published = (dense: Uint32Array): Uint32Array => dense.map((q) => ids[q]!)
  return packArrays(
    {
      qubits: published(qubits.qubit),
      qubitChain: qubits.chain,
      qubitBreaks: qubits.breaks,
      qubitPull: qubits.pull,
      couplers: published(couplers.ends),
      couplerChain: couplers.chain,
      couplerBreaks: couplers.breaks,
      couplerPull: couplers.pull,
    },
    { reads },
  )
}

/** The same in dense indices of the machine graph. */
export function unpackBreaks(packed: Uint8Array, indexOf: (id: number) => number): PartBreaks {
  const { meta, arrays } = unpackArrays(packed)
  const dense = (name: string): Uint32Array => Uint32Array.from(arrays[name]!, indexOf)
  const counts = (kind: 'qubit' | 'coupler') => ({
    chain: arrays[`${kind}Chain`] as Uint32Array,
    breaks: arrays[`${kind}Breaks`] as Uint32Array,
    pull: arrays[`${kind}Pull`] as Float32Array,
  })
  return {
    reads: meta.reads as number,
    qubits: { ...counts('qubit'), qubit: dense('qubits') },
    couplers: { ...counts('coupler'), ends: dense('couplers') },
  }
}
