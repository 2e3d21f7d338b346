import { plainTag, TAG_LIMITS, tagKey } from '#shared/library'

export interface TagInUse {
  tag: string
  count: number
}

export interface TagAnswer {
  key: string
  label: string
  note?: string
}

const MOST_ANSWERS = 8

/**
 * Tags that typed words may mean: those in use, the ones beginning with the words first, then the words themselves as a
 * new tag. A tag that is borne already is none of them.
 */
export function tagAnswers(typed: string, inUse: readonly TagInUse[], borne: readonly string[]): TagAnswer[] {
  const tag = plainTag(typed)
  const words = tagKey(tag)
  if (words === '' || borne.length >= TAG_LIMITS.count) return []
  const isBorne = new Set(borne.map(tagKey))
  const found = inUse
    .filter(({ tag }) => tagKey(tag).includes(words) && !isBorne.has(tagKey(tag)))
    .sort((a, b) => Number(tagKey(b.tag).startsWith(words)) - Number(tagKey(a.tag).startsWith(words)))
    .slice(0, MOST_ANSWERS)
    .map(({ tag, count }) => ({ key: tag, label: tag, note: count === 1 ? '1 problem' : `${count} problems` }))
  const isKnown = isBorne.has(words) || inUse.some(({ tag }) => tagKey(tag) === words)
  return isKnown || tag.length > TAG_LIMITS.length ? found : [...found, { key: tag, label: tag, note: 'new tag' }]
}

/** Why typed words give no tag. */
export function noTagWords(typed: string, borne: readonly string[]): string {
  if (borne.length >= TAG_LIMITS.count) return `A problem has at most ${TAG_LIMITS.count} tags. Take one away first.`
  if (borne.some((tag) => tagKey(tag) === tagKey(plainTag(typed)))) return 'It has this tag already.'
  return `A tag has at most ${TAG_LIMITS.length} characters.`
}
