/** How a text says that somebody is mentioned: `@[` and the person’s id `]`, so that a changed name stays right. */
const MENTION = /@\[([\w-]{1,64})\]/g

/** Ids of the people that a text mentions, each once. */
export const mentionedIn = (text: string): string[] => [...new Set([...text.matchAll(MENTION)].map(([, id]) => id!))]

/** A run of words, or somebody who is mentioned. */
export type TextPart = { text: string } | { id: string; name: string }

/** Splits a text at those of its mentions that are known; any other stays as it was written. */
export function partsOf(text: string, people: readonly { id: string; name: string }[]): TextPart[] {
  const parts: TextPart[] = []
  let end = 0
  for (const found of text.matchAll(MENTION)) {
    const person = people.find(({ id }) => id === found[1])
    if (!person) continue
    if (found.index > end) parts.push({ text: text.slice(end, found.index) })
    parts.push({ id: person.id, name: person.name })
    end = found.index + found[0].length
  }
  if (end < text.length) parts.push({ text: text.slice(end) })
  return parts
}

/** The text with names in place of ids, for where nothing can be marked. */
export const withNames = (text: string, people: readonly { id: string; name: string }[]): string =>
  partsOf(text, people)
    .map((part) => ('text' in part ? part.text : `@${part.name}`))
    .join('')
