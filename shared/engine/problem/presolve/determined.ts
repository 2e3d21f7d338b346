import type { Lifting } from './lift'
import { NONE } from './record'

/** Stands for a value that depends on the variables left. */
export const OPEN = 2

/**
 * What is already known of each variable, whatever is answered for those left: 0, 1 or `OPEN`. A value that all four
 * values of two open partners agree on is known too. O(variables).
 */
export function determinedValues({ variables, steps }: Lifting): Uint8Array {
  const values = new Uint8Array(variables).fill(OPEN)
  for (let k = steps.variable.length - 1; k >= 0; k--) {
    const optionsOf = (partner: number): readonly number[] => {
      if (partner === NONE) return [0]
      return values[partner] === OPEN ? [0, 1] : [values[partner]!]
    }
    const possible = new Set<number>()
    for (const y of optionsOf(steps.first[k]!))
      for (const z of optionsOf(steps.second[k]!)) possible.add((steps.table[k]! >> (y + 2 * z)) & 1)
    if (possible.size === 1) values[steps.variable[k]!] = [...possible][0]!
  }
  return values
}
