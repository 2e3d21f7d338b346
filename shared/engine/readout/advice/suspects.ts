import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { namesOf, weightOf } from './item'

/** Look at parts of the machine that break far oftener than their like over all returns (docs/formulas.md, Breaks by part). */
export function suspectParts({ suspects: { qubits, couplers } }: Evidence): AdviceItem[] {
  const parts = qubits.length + couplers.length
  if (parts === 0) return []
  const names = [...couplers.map(([a, b]) => `coupler ${a}–${b}`), ...qubits.map((qubit) => `qubit ${qubit}`)]
  return [
    {
      kind: 'suspects',
      weight: weightOf('suspects', parts / (parts + 1)),
      action: { look: 'machine', qubits, couplers },
      sentence: `Have the steward look at ${namesOf(names)}: over all returns from this calibration ${parts === 1 ? 'it breaks' : 'they break'} far more often than parts that are pulled as hard nearby. Listed as defects, the chains can be routed around them.`,
      evidence: [
        { name: 'suspected couplers in use', value: couplers.length, unit: 'count' },
        { name: 'suspected qubits in use', value: qubits.length, unit: 'count' },
      ],
    },
  ]
}
