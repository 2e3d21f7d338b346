import type { LatticeKind } from './kinds'
import type { ChainLayer, LatticeData, Lens, MarkLayer } from './types'

/** Sign of an entry of the legend; components/lattice/LegendMark.vue draws them. */
export type LegendSign =
  | 'band'
  | 'tube'
  | 'full-tube'
  | 'up'
  | 'down'
  | 'broken'
  | 'held'
  | 'ring'
  | 'free'
  | 'missing'
  | 'missing-coupler'
  | 'marked'
  | 'regained'
  | 'label'

export interface LegendEntry {
  readonly sign: LegendSign
  readonly words: string
  /** Kind of thing that the entry hides and shows; entries without one only explain. */
  readonly kind?: LatticeKind
}

export interface LegendInput {
  /** Lens shown, or null for a machine without chains. */
  readonly lens: Lens | null
  readonly oneRead: boolean
  readonly hasFocus: boolean
  readonly missing: boolean
  readonly missingCouplers: boolean
  readonly marks: string | null
  readonly regained?: string | null
}

/** What the lattice shows at the moment, the lens first. */
export function legendEntries({
  lens,
  oneRead,
  hasFocus,
  missing,
  missingCouplers,
  marks,
  regained,
}: LegendInput): LegendEntry[] {
  const entries: LegendEntry[] = []
  if (lens === 'occupancy') entries.push({ sign: 'band', words: 'chain' })
  if (lens === 'load') {
    entries.push({ sign: 'tube', words: 'filled from one end: coupling sum of the qubit ÷ range' })
    entries.push({ sign: 'full-tube', words: 'over 90 %' })
  }
  if (lens === 'breaks' && oneRead) entries.push({ sign: 'up', words: 'up' }, { sign: 'down', words: 'down' })
  if (lens === 'breaks') {
    const words = oneRead ? 'disagree in this read' : 'coupler that disagreed, with its share of reads (2 % and over)'
    entries.push({ sign: 'broken', words, kind: 'breaks' })
    if (!oneRead) entries.push({ sign: 'held', words: 'held' })
  }
  if (hasFocus && lens !== null && lens !== 'breaks')
    entries.push({ sign: 'ring', words: 'coupler carrying an interaction', kind: 'couplers' })
  if (lens) entries.push({ sign: 'label', words: 'labels', kind: 'labels' })
  entries.push({ sign: 'free', words: lens ? 'free qubit' : 'qubit', kind: 'free' })
  if (missing) entries.push({ sign: 'missing', words: 'missing qubit', kind: 'missing' })
  if (missingCouplers)
    entries.push({ sign: 'missing-coupler', words: 'missing coupler between working qubits', kind: 'missingCouplers' })
  if (marks) entries.push({ sign: 'marked', words: marks, kind: 'marks' })
  if (regained) entries.push({ sign: 'regained', words: regained, kind: 'regained' })
  return entries
}

/** How many there are of the kinds of thing that can be counted at a glance. */
export function kindCounts(
  { usable, missingCouplers }: Pick<LatticeData, 'usable' | 'missingCouplers'>,
  chains: Pick<ChainLayer, 'qubits'> | null,
  marks: MarkLayer | null,
): Partial<Record<LatticeKind, number>> {
  const working = usable.reduce((sum, works) => sum + (works ? 1 : 0), 0)
  return {
    free: working - new Set(chains?.qubits).size,
    missing: usable.length - working,
    missingCouplers: (missingCouplers?.length ?? 0) / 2,
    marks: (marks?.qubits.length ?? 0) + (marks?.couplers?.length ?? 0) / 2,
    regained: (marks?.regained?.qubits.length ?? 0) + (marks?.regained?.couplers.length ?? 0) / 2,
  }
}
