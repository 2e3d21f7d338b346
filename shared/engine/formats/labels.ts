import { isDecimal } from './numbers'
import type { ReadingIssue } from './format'

const DEFAULTS = { maxLength: 200, maxClashesShown: 20, maxExactDigits: 15 }

/** Why the text cannot be a variable's label, or null. */
export function labelFault(label: string): string | null {
  if (label.trim() === '') return 'a label is empty'
  if (label.length > DEFAULTS.maxLength) return `a label is longer than ${DEFAULTS.maxLength} characters`
  if (/[\p{Cc}\u2028\u2029]/u.test(label)) return 'a label holds a control character'
  if (/\p{Cs}/u.test(label)) return 'a label holds half of a character'
  return null
}

function isExactInteger(label: string): boolean {
  const digits = label.length - (label[0] === '-' || label[0] === '+' ? 1 : 0)
  if (digits === 0 || digits > DEFAULTS.maxExactDigits) return false
  for (let p = label.length - digits; p < label.length; p++) if (label[p]! < '0' || label[p]! > '9') return false
  return true
}

const PLAIN = /^[!-~]+$/

/** Two labels with the same key are taken for the same name written twice. */
export function clashKey(label: string): string {
  const trimmed = label.trim()
  const isNumber = trimmed.length <= DEFAULTS.maxExactDigits && isDecimal(trimmed)
  if (isNumber) return `number ${Number(trimmed) + 0}`
  // Most labels need no normalisation, and files may hold very many.
  if (PLAIN.test(trimmed)) return `text ${trimmed.toLowerCase()}`
  return `text ${trimmed.replace(/\s+/g, ' ').normalize('NFC').toLowerCase().normalize('NFC')}`
}

/** How two clashing labels differ, in words. */
function difference(a: string, b: string): string {
  if (a === b) return 'are the same'
  if (isDecimal(a.trim()) && isDecimal(b.trim())) return 'are the same number written differently'
  if (a.trim().replace(/\s+/g, ' ') === b.trim().replace(/\s+/g, ' ')) return 'differ only in white space'
  if (a.normalize('NFC') === b.normalize('NFC'))
    return 'look the same but are encoded differently (Unicode normalisation)'
  if (a.toLowerCase() === b.toLowerCase()) return 'differ only in upper and lower case'
  return 'differ only in case, white space or Unicode normalisation'
}

/**
 * One issue for each label that may be an earlier one misspelt: the same number, or the same but for case, white space
 * or Unicode normalisation (and, in a list of labels that should each stand once, the same label again).
 */
export function labelClashes(
  labels: readonly string[],
  lines: readonly number[],
  place: 'line' | 'variable' = 'line',
): ReadingIssue[] {
  const seen = new Map<string, number>()
  const issues: ReadingIssue[] = []
  for (let i = 0; i < labels.length && issues.length < DEFAULTS.maxClashesShown; i++) {
    const key = clashKey(labels[i]!)
    const first = seen.get(key)
    if (first === undefined) seen.set(key, i)
    else {
      const where = `the labels "${labels[first]}" (${place} ${lines[first]}) and "${labels[i]}" (${place} ${lines[i]})`
      const message = `${where} ${difference(labels[first]!, labels[i]!)}: give each variable one label`
      issues.push(place === 'line' ? { line: lines[i]!, message } : { message })
    }
  }
  return issues
}

/** The place of each label in ascending numerical order when all are integers, else null. */
export function numericRanks(labels: readonly string[]): Uint32Array | null {
  if (!labels.every(isExactInteger)) return null
  const numbers = Float64Array.from(labels, Number)
  const order = Uint32Array.from(numbers.keys()).sort((a, b) => numbers[a]! - numbers[b]!)
  const ranks = new Uint32Array(labels.length)
  order.forEach((index, rank) => (ranks[index] = rank))
  return ranks
}

/** Whether integer labels stand in ascending order; true when some label is not an integer. */
export function isNumericOrder(labels: readonly string[]): boolean {
  return numericRanks(labels)?.every((rank, index) => rank === index) ?? true
}

/** A label as a field of a comma-separated line, quoted where needed. */
export function quoteLabel(label: string): string {
  return /[\s",;#]/.test(label) ? `"${label.replaceAll('"', '""')}"` : label
}

/** @throws RangeError for labels that no reader would take back */
export function checkLabels(labels: readonly string[], n: number): void {
  if (labels.length !== n) throw new RangeError(`${labels.length} labels for ${n} variables`)
  for (const label of labels) {
    const fault = labelFault(label)
    if (fault) throw new RangeError(`the label ${JSON.stringify(label)} cannot be written: ${fault}`)
  }
  const clash = labelClashes(labels, [...labels.keys()], 'variable')[0]
  if (clash) throw new RangeError(clash.message)
}
