/** Reads the members of a problem document (`json.ts`), naming the path of whatever is wrong. */
import type { Directives } from './directives'
import { Entries } from './entries'
import type { ReadingIssue } from './format'
import { JSON_KIND, JSON_VERSION } from './json-kind'
import { shownJson } from './json-text'
import { labelClashes, labelFault, numericRanks } from './labels'
import { LIMITS } from './numbers'

const MEMBERS = [
  '$schema',
  'kind',
  'version',
  'form',
  'sense',
  'convention',
  'offset',
  'variables',
  'linear',
  'interactions',
]
const WORDS = { form: ['qubo', 'ising'], sense: ['min', 'max'], convention: ['plus', 'minus'] } as const
const DEFAULTS = { maxIssues: 20 }

type Members = Readonly<Record<string, unknown>>

const isObject = (value: unknown): value is Members =>
  typeof value === 'object' && value !== null && !Array.isArray(value)

/** Why a value can be no coefficient, or null. */
function numberFault(value: unknown): string | null {
  if (typeof value !== 'number') return `${shownJson(value)} is not a number`
  const size = Math.abs(value)
  if (size > LIMITS.greatest) return `the value is too large`
  return size > 0 && size < LIMITS.least ? `${value} is too close to zero` : null
}

export class DocumentReader {
  labels: string[] = []
  readonly directives: Directives = {}
  readonly issues: ReadingIssue[] = []
  private readonly entries = new Entries()
  private readonly indices = new Map<string, number>()
  private isListed = false
  private ranks: Uint32Array | null = null

  constructor(private readonly document: unknown) {}

  /** Entries by variable. */
  get terms(): { rows: Uint32Array; cols: Uint32Array; values: Float64Array } {
    const { rows, cols, values } = this.entries.terms()
    const { ranks } = this
    return ranks
      ? { rows: rows.map((i) => ranks[i]!), cols: cols.map((i) => ranks[i]!), values }
      : { rows, cols, values }
  }

  read(): void {
    const { document } = this
    if (!isObject(document)) return this.fault('', `${shownJson(document)} is not an object`)
    this.readHead(document)
    if (this.issues.length > 0) return
    this.readVariables(document.variables)
    this.readEntries('linear', document.linear, 1)
    this.readEntries('interactions', document.interactions, 2)
    if (this.issues.length > 0) return
    if (this.labels.length === 0) return this.fault('', 'the document names no variables')
    this.issues.push(...labelClashes(this.labels, [...this.labels.keys()], 'variable'))
    if (!this.isListed) this.sort()
  }

  /** Notes what is wrong where; afterwards enough is known once there are 20. */
  private fault(path: string, message: string): void {
    if (this.issues.length < DEFAULTS.maxIssues) this.issues.push({ message: path ? `${path}: ${message}` : message })
  }

  private readHead(document: Members): void {
    const unknown = Object.keys(document).filter((key) => !MEMBERS.includes(key))
    for (const key of unknown)
      this.fault(shownJson(key), `is no member of a problem document: ${MEMBERS.slice(1).join(', ')}`)
    const { $schema, kind, version, offset } = document
    if ($schema !== undefined && typeof $schema !== 'string')
      this.fault('$schema', `${shownJson($schema)} is not a text`)
    if (kind !== JSON_KIND) this.fault('kind', `must be "${JSON_KIND}", not ${shownJson(kind)}`)
    if (version !== JSON_VERSION) this.fault('version', `must be ${JSON_VERSION}, not ${shownJson(version)}`)
    for (const key of ['form', 'sense', 'convention'] as const) this.readWord(key, document[key])
    if (offset === undefined) return
    const fault = numberFault(offset)
    if (fault) this.fault('offset', fault)
    else this.directives.offset = (offset as number) + 0
  }

  private readWord(key: keyof typeof WORDS, value: unknown): void {
    if (value === undefined && key !== 'form') return
    const words: readonly unknown[] = WORDS[key]
    if (words.includes(value)) Object.assign(this.directives, { [key]: value })
    else this.fault(key, `must be ${words.map(shownJson).join(' or ')}, not ${shownJson(value)}`)
  }

  private readVariables(variables: unknown): void {
    if (variables === undefined) return
    if (!Array.isArray(variables)) return this.fault('variables', `${shownJson(variables)} is not a list`)
    this.isListed = true
    variables.forEach((value, k) => {
      const label = this.labelOf(value, `variables[${k}]`)
      if (label === null) return
      if (this.indices.has(label)) this.fault(`variables[${k}]`, `${shownJson(label)} stands in the list twice`)
      else this.add(label)
    })
  }

  private add(label: string): number {
    const index = this.labels.length
    this.labels.push(label)
    this.indices.set(label, index)
    return index
  }

  private labelOf(value: unknown, path: string): string | null {
    const isWhole = Number.isSafeInteger(value)
    if (typeof value !== 'string' && !isWhole) {
      this.fault(path, `${shownJson(value)} is no label: a text or a whole number`)
      return null
    }
    const label = String(value)
    const fault = this.indices.has(label) ? null : labelFault(label)
    if (fault) this.fault(path, fault)
    return fault ? null : label
  }

  private indexOf(value: unknown, path: string): number | null {
    const label = this.labelOf(value, path)
    if (label === null) return null
    const index = this.indices.get(label)
    if (index !== undefined) return index
    if (!this.isListed) return this.add(label)
    this.fault(path, `${shownJson(label)} is not among the variables`)
    return null
  }

  /** Entries of `width` labels and a value. */
  private readEntries(name: string, list: unknown, width: 1 | 2): void {
    if (list === undefined) return
    if (!Array.isArray(list)) return this.fault(name, `${shownJson(list)} is not a list`)
    for (let k = 0; k < list.length && this.issues.length < DEFAULTS.maxIssues; k++)
      this.readEntry(`${name}[${k}]`, list[k], width)
  }

  private readEntry(path: string, entry: unknown, width: 1 | 2): void {
    if (!Array.isArray(entry) || entry.length !== width + 1)
      return this.fault(path, `expected [${width === 1 ? 'label' : 'label, label'}, value], found ${shownJson(entry)}`)
    const row = this.indexOf(entry[0], `${path}[0]`)
    const col = width === 1 ? row : this.indexOf(entry[1], `${path}[1]`)
    const value: unknown = entry[width]
    const fault = numberFault(value)
    if (fault) return this.fault(`${path}[${width}]`, fault)
    if (row === null || col === null) return
    if (width === 2 && row === col)
      return this.fault(path, `joins ${shownJson(entry[0])} with itself: put it under "linear"`)
    this.entries.add(row, col, value as number)
  }

  /** Puts variables in numerical order when all labels are integers. */
  private sort(): void {
    this.ranks = numericRanks(this.labels)
    const sorted = this.labels.slice()
    this.ranks?.forEach((rank, index) => (sorted[rank] = this.labels[index]!))
    this.labels = sorted
  }
}
