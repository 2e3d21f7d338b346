import type { EmbeddingDamage } from '#shared/schemas/machines'
import type { BrokenView } from '#shared/schemas/repairs'
import type { MarkKind } from '../ui/parts'
import { formatCount, formatNumber, formatPercent } from '../format'

/** `2 of 40 chains`. */
export const damagedChains = ({ chains, ofChains }: EmbeddingDamage): string =>
  `${formatNumber(chains)} of ${formatCount(ofChains, 'chain')}`

/** Parts of the embedding that are missing: `3 qubits, 1 coupler`. */
export function missingParts({ qubitsLost, couplersLost }: EmbeddingDamage): string {
  const parts = [
    ...(qubitsLost.length > 0 ? [formatCount(qubitsLost.length, 'qubit')] : []),
    ...(couplersLost.length > 0 ? [formatCount(couplersLost.length, 'coupler')] : []),
  ]
  return parts.join(', ')
}

const MOST_NAMED = 12

/** The missing parts by number, the first of them: `17, 42, 8–9`. */
export function missingNames({ qubitsLost, couplersLost }: EmbeddingDamage): string {
  const names = [...qubitsLost.map(String), ...couplersLost.map((ends) => ends.join('–'))]
  const more = names.length - MOST_NAMED
  return names.slice(0, MOST_NAMED).join(', ') + (more > 0 ? ` and ${formatNumber(more)} more` : '')
}

/** `38 of 40 chains untouched (95 %)`. */
export function untouched(changed: number, ofChains: number): string {
  const kept = ofChains - changed
  const share = ofChains > 0 ? ` (${formatPercent(kept / ofChains, { significant: 2 })})` : ''
  return `${formatNumber(kept)} of ${formatCount(ofChains, 'chain')} untouched${share}`
}

export interface BrokenState {
  mark: MarkKind
  words: string
  /** What the words do not say: how far it is, what became of the last try. */
  more: string
}

const ENDINGS: Record<string, string> = {
  'none found': 'found none',
  cancelled: 'was cancelled',
  failed: 'failed',
  // Found, and broken by a calibration saved since.
  found: 'does not hold any more either',
}

/** How it stands with a broken embedding. */
export function brokenState({ state, repair, holdsAgain, damage }: BrokenView): BrokenState {
  if (state === 'holds again')
    return { mark: 'passed', words: `holds again at calibration ${formatNumber(holdsAgain)}`, more: '' }
  if (state === 'repaired')
    return {
      mark: 'passed',
      words: 'repaired as',
      more: untouched(repair!.changedChains ?? 0, damage.ofChains),
    }
  if (state === 'running')
    return { mark: 'computed', words: 'repair running:', more: formatPercent(repair!.progress, { significant: 2 }) }
  return { mark: 'caution', words: 'to repair', more: repair ? `the last repair ${ENDINGS[repair.status]}:` : '' }
}
