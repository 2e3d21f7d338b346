const COLLATOR = new Intl.Collator('en', { numeric: true })

/**
 * Indices of the labels that hold the words, whatever their case: the one that is them before all, then those that begin
 * with them, each in the order of their numbers and letters; none for no words.
 */
export function labelsHolding(labels: readonly string[], words: string, most = Infinity): number[] {
  const sought = words.trim().toLowerCase()
  if (sought === '') return []
  const rankOf = (label: string): number => (label === sought ? 0 : label.startsWith(sought) ? 1 : 2)
  return labels
    .flatMap((label, index) => {
      const lower = label.toLowerCase()
      return lower.includes(sought) ? [{ index, label, rank: rankOf(lower) }] : []
    })
    .sort((a, b) => a.rank - b.rank || COLLATOR.compare(a.label, b.label))
    .slice(0, most)
    .map(({ index }) => index)
}
