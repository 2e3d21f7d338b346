/** Pre-solve holds exact coefficients of any size, which takes memory: some hundred bytes an interaction. */
export const PRESOLVE_LIMITS = { variables: 100_000, interactions: 500_000 } as const

/** Sizes that are reduced in well under a second, so that the result can be told without having been asked for. */
const AT_ONCE = { variables: 2000, interactions: 10_000 } as const

interface Size {
  readonly variables: number
  readonly interactions: number
}

export const canPresolve = (size: Size): boolean =>
  size.variables <= PRESOLVE_LIMITS.variables && size.interactions <= PRESOLVE_LIMITS.interactions

export const presolvesAtOnce = (size: Size): boolean =>
  size.variables <= AT_ONCE.variables && size.interactions <= AT_ONCE.interactions
