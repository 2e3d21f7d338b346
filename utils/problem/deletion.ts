import type { EmbeddingOfProblem } from '#shared/schemas/problems'

const MOST_NAMED = 6

function named(numbers: string[], one: string): string {
  const shown = numbers.slice(0, MOST_NAMED).join(', ')
  const more = numbers.length > MOST_NAMED ? ' and more' : ''
  return `${numbers.length} ${one}${numbers.length === 1 ? '' : 's'}: ${shown}${more}`
}

/** What goes when the problem goes, a line each: its embeddings, their run sheets, and the samples of those. */
export function goesWith(embeddings: readonly EmbeddingOfProblem[]): string[] {
  const sheets = embeddings.flatMap(({ runSheets }) => runSheets)
  if (embeddings.length === 0) return []
  const lines = [
    named(
      embeddings.map(({ number, machine }) => `E-${number} on ${machine}`),
      'embedding',
    ),
  ]
  if (sheets.length === 0) return lines
  lines.push(
    named(
      sheets.map(({ number, state }) => `RS-${number} (${state})`),
      'run sheet',
    ),
  )
  return [...lines, 'all rehearsals and returned samples of these run sheets']
}
