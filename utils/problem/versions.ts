import type { DifferenceView, VersionChange, VersionItem, VersionStanding } from '#shared/schemas/problem-versions'
import { formatCount, formatNumber } from '../format'

/** `2 variables added, 1 renamed`, joined with commas; empty where nothing of the kind changed. */
function counted(parts: readonly [count: number, word: string][], thing: string): string {
  const told = parts.filter(([count]) => count > 0)
  return told
    .map(([count, word], k) => `${k === 0 ? formatCount(count, thing) : formatNumber(count)} ${word}`)
    .join(', ')
}

/** What changed from one version to the next, in one sentence without its full stop. */
export function changeWords(change: VersionChange): string {
  const words = [
    counted(
      [
        [change.variablesAdded, 'added'],
        [change.variablesRemoved, 'removed'],
        [change.variablesRenamed, 'renamed'],
      ],
      'variable',
    ),
    counted([[change.linearChanged, 'changed']], 'linear coefficient'),
    counted(
      [
        [change.interactionsAdded, 'added'],
        [change.interactionsRemoved, 'removed'],
        [change.interactionsChanged, 'changed'],
      ],
      'interaction',
    ),
    change.offsetChanged ? 'offset changed' : '',
    change.formChanged ? 'other form' : '',
    change.senseChanged ? 'other sense' : '',
  ].filter(Boolean)
  return words.length > 0 ? words.join('; ') : 'nothing but the order of the variables'
}

/** What the change means for embeddings of the version before. */
export const graphWords: Record<VersionChange['graph'], string> = {
  same: 'The same variables interact: an embedding of the one holds for the other.',
  fewer: 'Fewer interactions among the same variables: an embedding of the earlier one still holds.',
  changed: 'Other variables interact: an embedding has to be carried over by repair.',
}

export interface StandingWords {
  /** `Made for version 1; version 3 is current.` */
  what: string
  /** What it means and what to do. */
  next: string
}

/** What is said of something that was made for an earlier version; null where it is of the current one. */
export function standingWords({ version, current, graph }: VersionStanding): StandingWords | null {
  if (graph === null) return null
  const next = {
    same: 'The same variables interact, so the embedding still holds: carried over, it keeps every chain.',
    fewer: 'The current version has fewer interactions, so the embedding still holds: carry it over to use it there.',
    changed: 'Other variables interact now: carry the embedding over by repair, which keeps what can stay.',
  } as const
  return {
    what: `Made for version ${version}; version ${current} is current.`,
    next: next[graph],
  }
}

/** `holds for version 3 too`, beside an embedding of an earlier version in a table. */
export function standingNote({ current, graph }: VersionStanding): string {
  if (graph === null) return ''
  return graph === 'changed' ? `to be repaired for version ${current}` : `holds for version ${current} too`
}

/** `from berths.csv`, or how else the version came about. */
export function sourceWords({ source }: Pick<VersionItem, 'source'>): string {
  if (source.relabelled) return `labels of version ${source.relabelled} edited`
  return source.copyOf ? `copied from P-${source.copyOf.number}` : source.fileName
}

/** Lists of a difference that are shown cut: how many are left out. */
export const leftOut = ({ changes, ...difference }: DifferenceView) => ({
  added: difference.variablesAdded - difference.added.length,
  removed: difference.variablesRemoved - difference.removed.length,
  renamed: difference.variablesRenamed - difference.renamed.length,
  changes:
    difference.linearChanged +
    difference.interactionsAdded +
    difference.interactionsRemoved +
    difference.interactionsChanged -
    changes.length,
})
