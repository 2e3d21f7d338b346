import type { ChainSet } from './chain-set'
import { NO_ARM } from './template'
import type { Template } from './template'

/** Interval of places by variable and arm, at 2·variable + arm; empty where first > last. */
interface Reaches {
  readonly first: Int32Array
  readonly last: Int32Array
}

function include({ first, last }: Reaches, arm: number, place: number): void {
  first[arm] = Math.min(first[arm]!, place)
  last[arm] = Math.max(last[arm]!, place)
}

/** How far the arms of every variable must reach to meet its partners, and its corner if it needs both arms. */
function reachesOf({ problem }: ChainSet, template: Template, slotOf: Int32Array): Reaches {
  const { slots, armTo, placeTo, corners } = template
  const reaches: Reaches = {
    first: new Int32Array(2 * problem.order).fill(1 << 30),
    last: new Int32Array(2 * problem.order).fill(-1),
  }
  for (let i = 0; i < problem.order; i++) {
    if (slotOf[i]! < 0) continue
    for (let p = problem.offsets[i]!; p < problem.offsets[i + 1]!; p++) {
      const partner = slotOf[problem.targets[p]!]!
      const entry = slotOf[i]! * slots + partner
      if (partner >= 0 && armTo[entry] !== NO_ARM) include(reaches, 2 * i + armTo[entry]!, placeTo[entry]!)
    }
    const corner = 2 * slotOf[i]!
    if (corners[corner]! < 0 || reaches.last[2 * i]! >= 0 !== reaches.last[2 * i + 1]! >= 0) continue
    include(reaches, 2 * i, corners[corner]!)
    include(reaches, 2 * i + 1, corners[corner + 1]!)
  }
  return reaches
}

/**
 * Lays every variable along the arms of its slot, only as far as its own interactions need. Interactions of slots that
 * do not meet are left unmet, and chains without a corner in two parts.
 * @param set chains, all empty
 * @param slotOf by variable; −1 leaves it without a chain
 */
export function layChains(set: ChainSet, template: Template, slotOf: Int32Array): void {
  const { first, last } = reachesOf(set, template, slotOf)
  for (let i = 0; i < set.problem.order; i++) {
    if (slotOf[i]! < 0) continue
    for (let arm = 0; arm < 2; arm++) {
      const qubits = template.arms[slotOf[i]!]![arm]!
      for (let place = first[2 * i + arm]!; place <= last[2 * i + arm]!; place++) set.add(i, qubits[place]!)
    }
  }
}
