import type { UploadedGraph } from '#shared/schemas/machine-uploads'
import { formatNumber } from '../format'

export interface UploadedRow {
  what: string
  value: string
  note: string
}

/** What a person checks before a graph is kept. */
export function uploadedRows(graph: UploadedGraph): UploadedRow[] {
  const { qubits, couplers, leastDegree, mostDegree, parts, isolatedQubits, lowestNumber, highestNumber } = graph
  const gaps = highestNumber - lowestNumber + 1 - qubits
  return [
    {
      what: 'Qubits',
      value: formatNumber(qubits),
      note: `numbers ${formatNumber(lowestNumber)} to ${formatNumber(highestNumber)}${gaps > 0 ? `, ${formatNumber(gaps)} of them not used` : ''}`,
    },
    { what: 'Couplers', value: formatNumber(couplers), note: 'each counted once' },
    {
      what: 'Couplers a qubit',
      value: leastDegree === mostDegree ? formatNumber(mostDegree) : `${leastDegree} to ${mostDegree}`,
      note: isolatedQubits > 0 ? `${formatNumber(isolatedQubits)} without any` : 'none without any',
    },
    {
      what: 'Connected parts',
      value: formatNumber(parts),
      note: parts > 1 ? 'an embedding’s component stays within one part' : 'all qubits hang together',
    },
    {
      what: 'Positions',
      value: graph.positions,
      note: graph.positions === 'given' ? 'taken from the file' : 'none in the file: drawn from the couplers alone',
    },
  ]
}
