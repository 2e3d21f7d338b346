import { formatCount } from '../format'
import type { EditEffect } from './edit-effects'

const NAMED = 4

function listed(variables: readonly number[], labels: readonly string[]): string {
  const names = variables.slice(0, NAMED).map((v) => labels[v]!)
  if (variables.length > NAMED) return `${names.join(', ')} and ${variables.length - NAMED} more`
  return names.length < 2 ? names.join('') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`
}

function connection({ kind, pieces }: EditEffect, piecesBefore: number): string {
  if (pieces === 0) return 'leaves the chain without a qubit'
  if (pieces === 1) return piecesBefore > 1 ? 'makes the chain whole' : 'keeps the chain connected'
  if (pieces > piecesBefore)
    return kind === 'add' ? 'not coupled to the chain' : `breaks the chain into ${pieces} pieces`
  return `leaves the chain in ${pieces} pieces`
}

/** What a step would do, in words, and whether it breaks a rule that held before. */
export function effectWords(
  effect: EditEffect,
  piecesBefore: number,
  labels: readonly string[],
): { words: string; breaks: boolean } {
  const { pieces, meets, loses, couplers } = effect
  const parts = [connection(effect, piecesBefore)]
  if (meets.length > 0) parts.push(`meets ${listed(meets, labels)}, which had no coupler`)
  if (loses.length > 0) parts.push(`takes the only coupler to ${listed(loses, labels)}`)
  else if (couplers > 0 && meets.length === 0) parts.push(`${formatCount(couplers, 'coupler')} to interacting chains`)
  return { words: parts.join('; '), breaks: pieces === 0 || pieces > Math.max(1, piecesBefore) || loses.length > 0 }
}
