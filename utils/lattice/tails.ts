import type { SceneInput } from './scene-types'
import { colourOf, tiersOf } from './tiers'
import type { TierInput } from './tiers'

/** Whole qubits of chains, as thin lines beneath the bands, grouped by colour; those out of focus come first. */
export interface Tails {
  readonly color: string
  readonly qubits: readonly number[]
}

export function tailsOf(input: TierInput & Pick<SceneInput, 'hues' | 'tokens' | 'lens'>): Tails[] {
  const tiers = tiersOf(input)
  const groups = new Map<string, number[]>([[input.tokens.rule, []]])
  for (const { qubit, chain } of input.geometry.spans) {
    const tier = tiers[chain]!
    const grey = tier === 'far' ? input.tokens.rule : input.tokens.edge
    const color = input.lens === 'occupancy' ? colourOf(input, chain, tier) : grey
    const group = groups.get(color)
    if (group) group.push(qubit)
    else groups.set(color, [qubit])
  }
  return [...groups].map(([color, qubits]) => ({ color, qubits }))
}
