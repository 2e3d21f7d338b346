import type { EmbeddingMethod, MethodUsed, Objective } from '#shared/schemas/embeddings'

/** The ways to look for an embedding that a person may ask for, each with what it is for. */
export const METHOD_CHOICES = [
  {
    value: 'auto',
    name: 'Automatic',
    purpose: 'Runs the methods that fit this problem and machine, and keeps the best of what they find.',
  },
  {
    value: 'search',
    name: 'Search',
    purpose:
      'For sparse problems: variables are placed near those they interact with, and chains rerouted until no qubit is wanted twice.',
  },
  {
    value: 'lines',
    name: 'Lines',
    purpose: 'For dense problems that are not complete: each variable takes a line of the machine in each direction.',
  },
  {
    value: 'template',
    name: 'Template',
    purpose: 'For complete or bipartite problems: a regular pattern of chains, fitted around missing qubits.',
  },
] as const

export type MethodChoice = (typeof METHOD_CHOICES)[number]['value']

export const METHOD_NAMES: Record<EmbeddingMethod, string> = {
  auto: 'automatic',
  search: 'search',
  lines: 'lines',
  template: 'template',
  repair: 'repair',
  shorten: 'shortening',
  imported: 'imported',
  edited: 'edited by hand',
}

export const OBJECTIVE_CHOICES: readonly { value: Objective; label: string }[] = [
  { value: 'longest chain', label: 'Longest chain' },
  { value: 'total qubits', label: 'Total of qubits' },
]

const PHASES: Record<string, string> = {
  placing: 'placing the first chains',
  rerouting: 'rerouting chains that overlap',
  'assigning lines': 'giving each variable its lines',
  'fitting the template': 'fitting the pattern',
  repairing: 'rerouting damaged chains',
  shortening: 'shortening chains',
}

/** What a try is doing, in words. */
export const phaseWords = (phase: string): string => PHASES[phase] ?? phase

/** Whether a search gave the embedding, so that it has a seed and took time. */
export const isSearched = (method: EmbeddingMethod): boolean => method !== 'imported' && method !== 'edited'

/** The method that gave the embedding, else the one asked for. */
export const methodName = ({
  method,
  methodUsed,
}: {
  method: EmbeddingMethod
  methodUsed: MethodUsed | null
}): string => METHOD_NAMES[methodUsed ?? method] ?? method
