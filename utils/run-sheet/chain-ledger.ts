import { csvCell } from '#shared/csv'
import type { ChainRow } from '#shared/schemas/run-sheets'
import type { Sort } from '../ui/parts'
import type { StrengthDraft } from './draft'
import { isBreakable } from './chains'
import { draftedStrength, hasOwnStrength } from './strength-edits'

/** One line of the table of chains: as programmed, with the strength that is drafted. */
export interface ChainLine extends ChainRow {
  /** Has a strength of its own. */
  readonly isOwn: boolean
  /** k over the cut bound; Infinity where there is no bound to hold, or no coupler. */
  readonly ratio: number
}

export type ChainColumn = 'variable' | 'qubits' | 'couplers' | 'strength' | 'cutBound' | 'ratio'

export const CHAIN_COLUMNS: readonly { readonly field: ChainColumn; readonly label: string }[] = [
  { field: 'variable', label: 'Variable' },
  { field: 'qubits', label: 'Qubits' },
  { field: 'couplers', label: 'Couplers' },
  { field: 'strength', label: 'k' },
  { field: 'cutBound', label: 'Cut bound' },
  { field: 'ratio', label: 'k / bound' },
]

export type ChainsShown = 'all' | 'below' | 'own' | 'selected'

export const CHAINS_SHOWN: readonly { readonly value: ChainsShown; readonly label: string }[] = [
  { value: 'all', label: 'all chains' },
  { value: 'below', label: 'below their bound' },
  { value: 'own', label: 'with a strength of their own' },
  { value: 'selected', label: 'selected' },
]

export const isBelow = ({ ratio }: Pick<ChainLine, 'ratio'>): boolean => ratio < 1

export function chainLines(chains: readonly ChainRow[], draft: StrengthDraft): ChainLine[] {
  return chains.map((chain) => {
    const strength = draftedStrength(chain, draft)
    const ratio = isBreakable(chain) && chain.cutBound > 0 ? strength / chain.cutBound : Infinity
    return { ...chain, strength, ratio, isOwn: isBreakable(chain) && hasOwnStrength(chain, draft) }
  })
}

/** Lines in the order of a heading, and as they stand in the problem where they are equal. */
export function sortedLines(lines: readonly ChainLine[], { field, direction }: Sort): ChainLine[] {
  const column = field as ChainColumn
  const sign = direction === 'ascending' ? 1 : -1
  return [...lines].sort((a, b) => {
    const [x, y] = [a[column], b[column]]
    return x === y ? a.variable - b.variable : sign * (x < y ? -1 : 1)
  })
}

/** Lines of which the label holds what is typed, in small or capital letters, and that meet the condition. */
export function filteredLines(
  lines: readonly ChainLine[],
  words: string,
  shown: ChainsShown,
  selected: ReadonlySet<number>,
): ChainLine[] {
  const sought = words.trim().toLowerCase()
  const meets: Record<ChainsShown, (line: ChainLine) => boolean> = {
    all: () => true,
    below: isBelow,
    own: ({ isOwn }) => isOwn,
    selected: ({ variable }) => selected.has(variable),
  }
  return lines.filter((line) => line.label.toLowerCase().includes(sought) && meets[shown](line))
}

/** The lines as a file. Chains of one qubit have neither strength nor bound. */
export function linesCsv(lines: readonly ChainLine[]): string {
  const rows = lines.map((line) => {
    const figures = isBreakable(line) ? [line.strength, line.cutBound, line.cutBoundExact] : ['', '', '']
    return `${[csvCell(line.label), line.qubits, line.couplers, ...figures].join(',')}\n`
  })
  return `variable,qubits,couplers to others,k,cut bound,bound exact\n${rows.join('')}`
}
