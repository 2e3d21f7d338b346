import type { Form } from '#shared/engine/problem/problem'

/** A problem as it is drawn: variables and interactions by dense index, coefficients in the problem's own sense. */
export interface ProblemGraph {
  readonly labels: readonly string[]
  /** Form in which the problem was given. */
  readonly form: Form
  /** Of the problem's content. */
  readonly fingerprint: string
  /** Interaction k joins variables rows[k] < cols[k]. */
  readonly rows: Uint32Array
  readonly cols: Uint32Array
  readonly quboLinear: Float64Array
  readonly isingLinear: Float64Array
  readonly quboValues: Float64Array
  readonly isingValues: Float64Array
}

/** The coefficients of one form. */
export interface Coefficients {
  readonly linear: Float64Array
  readonly values: Float64Array
}

export const coefficientsOf = (graph: ProblemGraph, form: Form): Coefficients =>
  form === 'qubo'
    ? { linear: graph.quboLinear, values: graph.quboValues }
    : { linear: graph.isingLinear, values: graph.isingValues }

/** For each variable its interactions: those of variable i are at offsets[i] … offsets[i + 1] − 1 of both lists. */
export interface Partners {
  readonly offsets: Uint32Array
  readonly variables: Uint32Array
  readonly interactions: Uint32Array
}

export function partnersOf({ labels, rows, cols }: Pick<ProblemGraph, 'labels' | 'rows' | 'cols'>): Partners {
  const offsets = new Uint32Array(labels.length + 1)
  for (let k = 0; k < rows.length; k++) {
    offsets[rows[k]! + 1]!++
    offsets[cols[k]! + 1]!++
  }
  for (let i = 0; i < labels.length; i++) offsets[i + 1]! += offsets[i]!
  const next = offsets.slice()
  const variables = new Uint32Array(2 * rows.length)
  const interactions = new Uint32Array(2 * rows.length)
  const note = (variable: number, partner: number, interaction: number) => {
    const at = next[variable]!++
    variables[at] = partner
    interactions[at] = interaction
  }
  for (let k = 0; k < rows.length; k++) {
    note(rows[k]!, cols[k]!, k)
    note(cols[k]!, rows[k]!, k)
  }
  return { offsets, variables, interactions }
}

export interface Partner {
  readonly variable: number
  readonly interaction: number
}

/** Interactions of one variable, in the order of its partners. */
export function partnersOfVariable({ offsets, variables, interactions }: Partners, variable: number): Partner[] {
  const found: Partner[] = []
  for (let at = offsets[variable] ?? 0; at < (offsets[variable + 1] ?? 0); at++)
    found.push({ variable: variables[at]!, interaction: interactions[at]! })
  return found
}
