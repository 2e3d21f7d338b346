interface Named {
  id: string
  name: string
}

const LONGEST_NAME = 80
const isLetter = (character: string | undefined): boolean => character !== undefined && /[\p{L}\p{N}]/u.test(character)

/** What is being typed of a name before the caret: from its `@`, which begins a word; null where none is. */
export function askedBefore(text: string, caret: number): { from: number; words: string } | null {
  const from = text.lastIndexOf('@', caret - 1)
  if (from < 0 || caret - from > LONGEST_NAME || isLetter(text[from - 1])) return null
  const words = text.slice(from + 1, caret)
  return /[\n@]|^\s/.test(words) ? null : { from, words }
}

/** Members of whose names a word, or the whole, begins so; in the order given. */
export function membersFor<T extends Named>(members: readonly T[], words: string): T[] {
  const begin = words.toLocaleLowerCase()
  const fits = (name: string): boolean => {
    const whole = name.toLocaleLowerCase()
    return whole.startsWith(begin) || whole.split(/\s+/).some((word) => word.startsWith(begin))
  }
  return members.filter(({ name }) => fits(name))
}

/**
 * The text as it is sent: every `@` with the name of a member becomes a mention by id. Of several with one name the one that
 * was chosen is meant.
 */
export function withMentions(text: string, chosen: readonly Named[], members: readonly Named[]): string {
  const names = [...chosen, ...members].sort((a, b) => b.name.length - a.name.length)
  let written = ''
  for (let at = 0; at < text.length;) {
    const begins = text[at] === '@' && !isLetter(text[at - 1])
    const person = begins
      ? names.find(({ name }) => text.startsWith(name, at + 1) && !isLetter(text[at + 1 + name.length]))
      : undefined
    written += person ? `@[${person.id}]` : text[at]
    at += person ? person.name.length + 1 : 1
  }
  return written
}
