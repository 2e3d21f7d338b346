import type { z } from 'zod'

/** What stands in an input, in the words of somebody who writes JSON or fills in a form. */
const TYPES: Record<string, string> = {
  array: 'a list',
  boolean: 'true or false',
  int: 'a whole number',
  number: 'a number',
  object: 'an object',
  record: 'an object',
  string: 'text',
}

/** What is counted, one of it and several. */
const UNITS: Record<string, [string, string]> = {
  array: ['entry', 'entries'],
  string: ['character', 'characters'],
}

const listed = (values: readonly unknown[]): string => {
  const words = values.map(String)
  return words.length < 2 ? words.join() : `${words.slice(0, -1).join(', ')} or ${words.at(-1)}`
}

/** The most or the least that is taken: of numbers themselves, of the rest how many. */
function bound(word: string, origin: string, limit: number | bigint, isInclusive: boolean | undefined): string {
  const [one, several] = UNITS[origin] ?? []
  const unit = one ? ` ${Number(limit) === 1 ? one : several}` : ''
  if (isInclusive === false) return `${word === 'at most' ? 'less' : 'more'} than ${limit}${unit}`
  return `${word} ${limit}${unit}`
}

function ofType(issue: z.core.$ZodRawIssue<z.core.$ZodIssueInvalidType>): string {
  const due = TYPES[issue.expected] ?? issue.expected
  return issue.input === undefined ? `is missing: give ${due}` : `give ${due}`
}

/**
 * What is wrong with a value and what to give instead, as the end of a sentence.
 * Undefined where the issue brings words of its own, or is none of those that schemas here can raise.
 */
export function issueWords(issue: z.core.$ZodRawIssue): string | undefined {
  switch (issue.code) {
    case 'invalid_type':
      return ofType(issue)
    case 'too_big':
      return bound('at most', issue.origin, issue.maximum, issue.inclusive)
    case 'too_small':
      return bound('at least', issue.origin, issue.minimum, issue.inclusive)
    case 'invalid_value':
      return `give ${listed(issue.values)}`
    case 'invalid_union':
      return 'options' in issue && Array.isArray(issue.options) ? `give ${listed(issue.options)}` : undefined
    case 'unrecognized_keys':
      return `knows no ${listed(issue.keys)}`
    default:
      return undefined
  }
}
