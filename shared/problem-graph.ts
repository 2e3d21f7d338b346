/** Up to what size a problem is drawn as a graph: above, lines cover each other and say less than the tables. */
export const PROBLEM_GRAPH_LIMITS = { variables: 2000, interactions: 20_000 } as const

/** Whether a problem of this size is drawn as a graph. */
export const isDrawnAsGraph = ({ variables, interactions }: { variables: number; interactions: number }): boolean =>
  variables <= PROBLEM_GRAPH_LIMITS.variables && interactions <= PROBLEM_GRAPH_LIMITS.interactions
