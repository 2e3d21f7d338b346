import type { Letter, LetterPart } from './letter'
import { lineByLine, oneLine } from './letter'

const MOST_LISTED = 5
const LONGEST_QUOTE = 400

/** A letter as it is told in the product: plain text without the list of pages. */
export interface NewsWords {
  title: string
  text: string
  quote: string | null
  path: string
}

function listed(part: LetterPart | undefined): string {
  if (!part || !('list' in part)) return ''
  const names = part.list.slice(0, MOST_LISTED).map(({ text }) => oneLine(text))
  const more = part.list.length - names.length
  return ` ${names.join('; ')}${more > 0 ? `; and ${more} more` : ''}.`
}

function shortened(text: string): string {
  const characters = [...text]
  return characters.length > LONGEST_QUOTE ? `${characters.slice(0, LONGEST_QUOTE - 1).join('')}…` : text
}

/** Says the same as a letter in fewer words: its subject, its first words with what they list, and what a person wrote. */
export function newsOfLetter({ subject, parts, action }: Letter): NewsWords {
  const first = parts.findIndex((part) => 'text' in part)
  const opening = parts[first]
  const quoted = parts.find((part) => 'quote' in part)
  return {
    title: oneLine(subject),
    text: opening && 'text' in opening ? lineByLine(opening.text) + listed(parts[first + 1]) : '',
    quote: quoted ? shortened(lineByLine(quoted.quote)) : null,
    path: action.path,
  }
}
