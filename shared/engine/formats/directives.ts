/**
 * What a file may say about itself in comment lines `# key: value`:
 *   form: qubo | ising       convention: plus | minus      sense: min | max      offset: number
 *   layout: list | matrix    which of the text formats this is
 *   variable order: listed   variables keep the order of first appearance even if all labels are integers
 * Keys and words are read without regard to case; other keys are ordinary comments.
 */
import type { Form } from '../problem/problem'
import type { Convention, ProblemReading, ReadingIssue, ReadOptions, Sense } from './format'
import { numberFault, parseNumber } from './numbers'

const WORDS = {
  form: ['qubo', 'ising'],
  convention: ['plus', 'minus'],
  sense: ['min', 'max'],
  'variable order': ['listed'],
  layout: ['list', 'matrix'],
} as const

type WordKey = keyof typeof WORDS

export interface Directives {
  form?: Form
  convention?: Convention
  sense?: Sense
  'variable order'?: 'listed'
  layout?: 'list' | 'matrix'
  offset?: number
}

const isWordKey = (key: string): key is WordKey => Object.hasOwn(WORDS, key)

/** Takes in one comment (the text after `#`); returns why it is refused, or null when it is fine or says nothing. */
export function readDirective(comment: string, into: Directives): string | null {
  const colon = comment.indexOf(':')
  if (colon < 0) return null
  const key = comment.slice(0, colon).trim().toLowerCase()
  const text = comment.slice(colon + 1).trim()
  if (key !== 'offset' && !isWordKey(key)) return null
  let value: string | number
  if (key === 'offset') {
    value = parseNumber(text)
    if (Number.isNaN(value)) return `offset: ${numberFault(text)}`
  } else {
    value = text.toLowerCase()
    const words: readonly string[] = WORDS[key]
    if (!words.includes(value)) return `${key} must be ${words.join(' or ')}, not "${text.slice(0, 40)}"`
  }
  if (into[key] !== undefined && into[key] !== value) return `${key} was given before as ${into[key]}`
  Object.assign(into, { [key]: value })
  return null
}

/** What holds for a reading once options, file and defaults are weighed. */
export type Settings = Pick<ProblemReading, 'form' | 'formSource' | 'convention' | 'sense'> & { offset: number }

export function resolveSettings(
  options: ReadOptions,
  said: Directives,
): { settings: Settings; issues: ReadingIssue[] } {
  const settings: Settings = {
    form: options.form ?? said.form ?? 'qubo',
    formSource: options.form ? 'given' : said.form ? 'file' : 'default',
    convention: options.convention ?? said.convention ?? 'plus',
    sense: options.sense ?? said.sense ?? 'min',
    offset: said.offset ?? 0,
  }
  if (settings.form === 'ising' || settings.convention === 'plus') return { settings, issues: [] }
  const message =
    'the convention E = −Σ h s − Σ J s s belongs to the Ising form, but this is read as a QUBO: choose the Ising form, or the plus convention'
  return { settings, issues: [{ message }] }
}

/** The comment lines that let a text speak for itself; offset in the sense of the document. */
export function writeDirectives(directives: Directives): string[] {
  return Object.entries(directives).map(([key, value]) => `# ${key}: ${value}`)
}
