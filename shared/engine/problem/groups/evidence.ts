/**
 * Whether cliques of equal couplings are more than chance. The couplings of one value are described twice: as any so
 * many of all pairs, and as sets of variables plus the few pairs that do not fit. The second is believed where it is
 * shorter (minimum description length: Rissanen, Modeling by shortest data description, Automatica 14, 1978). A
 * structure that saves b bits would come up by chance in about one random problem of 2^b.
 */

/** log2 n!, by Stirling's series; to a thousandth of a bit from 1 on. */
function log2Factorial(n: number): number {
  if (n < 2) return 0
  return (n * Math.log(n) - n + 0.5 * Math.log(2 * Math.PI * n) + 1 / (12 * n)) / Math.LN2
}

/** log2 of the number of ways to choose k of n. */
export const log2Choose = (n: number, k: number): number =>
  k <= 0 || k >= n ? 0 : Math.max(0, log2Factorial(n) - log2Factorial(k) - log2Factorial(n - k))

export interface Evidence {
  /** Variables of the problem. */
  readonly n: number
  /** Pairs whose coupling has the value. */
  readonly pairs: number
  /** Members and pairs with the value of each set. */
  readonly sets: readonly { readonly size: number; readonly inside: number }[]
  /** Members of sets whose linear coefficient is just what the sets foretell, and the others. */
  readonly foretold: number
  readonly notForetold: number
}

/** That one linear coefficient in four agrees by chance: what an agreement saves, and what a miss costs, in bits. */
const BY_CHANCE = 1 / 4
const SAVED = -Math.log2(BY_CHANCE)
const LOST = -Math.log2(1 - BY_CHANCE)

const pairsOf = (size: number): number => (size * (size - 1)) / 2

/** Bits that the description by sets saves; negative where it is the longer one. */
export function bitsSaved({ n, pairs, sets, foretold, notForetold }: Evidence): number {
  const all = pairsOf(n)
  const covered = sets.reduce((sum, { inside }) => sum + inside, 0)
  const described = sets.reduce(
    (bits, { size, inside }) => bits + log2Choose(n, size) + log2Choose(pairsOf(size), pairsOf(size) - inside),
    log2Choose(all, pairs - covered),
  )
  return log2Choose(all, pairs) - described + foretold * SAVED - notForetold * LOST
}
