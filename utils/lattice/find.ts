import { labelsHolding } from '../find-labels'
import type { LatticeData } from './types'

/** A chain or a qubit that was looked for. */
export type Found =
  { readonly kind: 'chain'; readonly variable: number } | { readonly kind: 'qubit'; readonly qubit: number }

export interface Findable {
  readonly data: Pick<LatticeData, 'ids' | 'usable'>
  /** Labels of the variables that have chains; none on a machine by itself. */
  readonly labels: readonly string[]
  /** Chain of each qubit, or −1. */
  readonly owner: Int32Array
}

export const FIND_DEFAULTS = {
  /** Most answers to one question. */
  most: 8,
}

/**
 * Chains whose label holds the words, those that begin with them first and the one that is them before all; then the
 * qubit of that number and those whose numbers begin with it. `qubit 17` and `q17` mean the qubit alone.
 */
export function findThings(words: string, { data, labels }: Findable, most = FIND_DEFAULTS.most): Found[] {
  const sought = words.trim().toLowerCase()
  if (sought === '') return []
  const [, prefix = '', digits] = /^(q(?:ubit)?\s*)?(\d+)$/.exec(sought) ?? []
  const qubits = digits === undefined ? [] : qubitsFrom(data.ids, digits, most)
  const chains: Found[] = prefix
    ? []
    : labelsHolding(labels, sought, most).map((variable) => ({ kind: 'chain', variable }))
  // A number means a qubit at least as often as a variable, so that room is kept for it.
  return [...chains.slice(0, qubits.length > 0 ? most - 1 : most), ...qubits].slice(0, most)
}

function qubitsFrom(ids: Uint32Array, digits: string, most: number): Found[] {
  const exact = ids.indexOf(Number(digits))
  const found: Found[] = exact < 0 ? [] : [{ kind: 'qubit', qubit: exact }]
  for (let q = 0; q < ids.length && found.length < most; q++)
    if (q !== exact && String(ids[q]).startsWith(digits)) found.push({ kind: 'qubit', qubit: q })
  return found
}

/** What a qubit is: missing, free, or in the chain of some variable. */
export function qubitWords(qubit: number, { data, labels, owner }: Findable): string {
  if (!data.usable[qubit]) return owner[qubit]! >= 0 ? `missing, in the chain of ${labels[owner[qubit]!]}` : 'missing'
  return owner[qubit]! >= 0 ? `in the chain of ${labels[owner[qubit]!]}` : 'free'
}

/** The qubit whose number the words are; null where they are none of the machine. */
export function exactQubit(words: string, ids: Uint32Array): number | null {
  const digits = /^\s*(?:q(?:ubit)?\s*)?(\d+)\s*$/i.exec(words)?.[1]
  const at = digits === undefined ? -1 : ids.indexOf(Number(digits))
  return at < 0 ? null : at
}
