import { chainLengths } from '../../shared/engine/readout/breaks'
import type { ChainBreaks, CouplerBreaks, QubitBreaks, ReturnView } from '../../shared/schemas/returns'
import type { LoadedReturn } from './loaded-return'
import { proportion } from './proportion'

/** Where chains broke: by chain, by coupler inside a chain, by qubit, and by read. */
export function breaksView({ bench, programming, programmed, summary }: LoadedReturn): ReturnView['breaks'] {
  const { breaks } = summary
  const ids = bench.machine.fabric.ids
  const lengths = chainLengths(programmed)
  const chains: ChainBreaks[] = bench.labels.map((label, i) => ({
    variable: i,
    label,
    length: lengths[i]!,
    strength: programmed.chainStrength[i]!,
    cutBound: programming.bounds.bound[i]!,
    cutBoundExact: programming.bounds.exact[i] === 1,
    cutSplit: lengths[i]! > 1 ? programming.bounds.splits[i]! : null,
    ...proportion(breaks.perChain.breaks[i]!, breaks.reads),
  }))
  const couplers: CouplerBreaks[] = []
  programmed.isChainCoupler.forEach((inside, c) => {
    if (!inside || breaks.perCoupler[c] === 0) return
    const [a, b] = [programmed.ends[2 * c]!, programmed.ends[2 * c + 1]!]
    couplers.push({
      a: ids[programmed.qubits[a]!]!,
      b: ids[programmed.qubits[b]!]!,
      label: bench.labels[programmed.chainOf[a]!]!,
      ...proportion(breaks.perCoupler[c]!, breaks.reads),
    })
  })
  const qubits: QubitBreaks[] = []
  programmed.chainOf.forEach((i, p) => {
    const count = breaks.perQubit[p]!
    if (count > 0)
      qubits.push({ qubit: ids[programmed.qubits[p]!]!, label: bench.labels[i]!, ...proportion(count, breaks.reads) })
  })
  const chainBreaks = chains.reduce((sum, { count }) => sum + count, 0)
  return {
    chains,
    couplers: couplers.sort((x, y) => y.rate - x.rate),
    qubits: qubits.sort((x, y) => y.rate - x.rate),
    readsWithBreak: proportion(breaks.readsWithBreak, breaks.reads),
    chainReads: proportion(chainBreaks, breaks.chainReads),
    perRead: breaks.perRead.histogram,
  }
}
