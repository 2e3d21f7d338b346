import { darkHues, lightHues } from '~/assets/css/tokens'
import type { HueName } from '~/assets/css/tokens'

/**
 * The hues of chains. Eight hues, each with a light and a dark shade, and three inlays within a hue. They name a chain,
 * never a value; the label settles which chain it is.
 */
export interface Hue {
  readonly name: string
  readonly light: string
  readonly dark: string
}

export const HUES: readonly Hue[] = (Object.keys(lightHues) as HueName[]).map((name) => ({
  name,
  light: lightHues[name],
  dark: darkHues[name],
}))

export const INLAYS = ['plain', 'line', 'dots'] as const
export type Inlay = (typeof INLAYS)[number]

/** Hue and inlay of every chain, as indices into HUES and INLAYS. */
export interface ChainHues {
  readonly hue: Uint8Array
  readonly inlay: Uint8Array
}

/** Chains that should not look alike: pairs of chains, and for each pair how much it matters. */
export interface HueConflicts {
  readonly pairs: Uint32Array
  readonly weights: Float32Array
}

/**
 * Greedy colouring by descending degree: each chain takes the hue with the least conflict weight among its neighbours
 * already coloured, then the hue least used so far, then the first. Inlays rotate within a hue.
 *
 * @throws RangeError when the pairs and weights do not match or name a chain that does not exist.
 */
export function assignHues(chains: number, { pairs, weights }: HueConflicts): ChainHues {
  if (pairs.length !== 2 * weights.length) throw new RangeError('one weight is needed for each pair of chains')
  const around = conflictLists(chains, pairs, weights)
  const order = Array.from({ length: chains }, (_, i) => i)
  order.sort((a, b) => around[b]!.length - around[a]!.length || a - b)

  const hue = new Uint8Array(chains)
  const inlay = new Uint8Array(chains)
  const coloured = new Uint8Array(chains)
  const used = new Uint32Array(HUES.length)
  for (const chain of order) {
    const conflict = new Float64Array(HUES.length)
    for (const [other, weight] of around[chain]!) if (coloured[other]) conflict[hue[other]!]! += weight
    let best = 0
    for (let h = 1; h < HUES.length; h++) {
      const difference = conflict[h]! - conflict[best]!
      if (difference < 0 || (difference === 0 && used[h]! < used[best]!)) best = h
    }
    hue[chain] = best
    inlay[chain] = used[best]! % INLAYS.length
    used[best]!++
    coloured[chain] = 1
  }
  return { hue, inlay }
}

function conflictLists(chains: number, pairs: Uint32Array, weights: Float32Array): [number, number][][] {
  const around: [number, number][][] = Array.from({ length: chains }, () => [])
  weights.forEach((weight, k) => {
    const a = pairs[2 * k]!
    const b = pairs[2 * k + 1]!
    if (a >= chains || b >= chains) throw new RangeError(`pair ${k} names a chain that does not exist`)
    if (a === b) return
    around[a]!.push([b, weight])
    around[b]!.push([a, weight])
  })
  return around
}
