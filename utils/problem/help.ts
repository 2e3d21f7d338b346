import type { ProblemItem } from '#shared/schemas/problems'
import type { HelpCase } from '../help/registry'

/** How the columns of the library are computed, problem by problem. */

export const densityCases = (items: readonly ProblemItem[]): HelpCase[] =>
  items.flatMap(({ name, variables, interactions }) =>
    // There is no pair among fewer than two.
    variables > 1 ? [{ label: name, help: { id: 'density', given: { variables, interactions } } }] : [],
  )

export const bestCases = (items: readonly ProblemItem[]): HelpCase[] =>
  items.flatMap(({ name, best, sense }) =>
    best === null ? [] : [{ label: name, help: { id: 'bestOfProblem', given: { best, sense } } }],
  )
