/**
 * Names of variables that a format only numbers, in comments `variable 3: north berth`; quoted as in coefficient lists
 * where white space or quotes would be lost.
 */
import { quoteLabel } from './labels'

const NAME = /^\s*variable\s+(\d{1,9})\s*:\s*(.*?)\s*$/i
const QUOTED = /^"((?:[^"]|"")*)"$/

export class NumberedNames {
  private readonly names = new Map<number, { readonly name: string; readonly line: number }>()

  /** Takes in a comment; answers why it is refused, null when it is taken in, undefined when it names no variable. */
  read(comment: string, line: number): string | null | undefined {
    const match = NAME.exec(comment)
    if (!match) return undefined
    const number = Number(match[1])
    const name = QUOTED.exec(match[2]!)?.[1]!.replaceAll('""', '"') ?? match[2]!
    if (this.names.has(number)) return `variable ${number} was named before, in line ${this.names.get(number)!.line}`
    this.names.set(number, { name, line })
    return null
  }

  /** The labels of n variables with the line of each; those without a name are called by their number. */
  labels(n: number, sizeLine: number): { labels: string[]; lines: number[] } {
    const labels: string[] = []
    const lines: number[] = []
    for (let i = 1; i <= n; i++) {
      const named = this.names.get(i)
      labels.push(named?.name ?? String(i))
      lines.push(named?.line ?? sizeLine)
    }
    return { labels, lines }
  }

  get count(): number {
    return this.names.size
  }
}

export const isNumbered = (labels: readonly string[]): boolean => labels.every((label, i) => label === String(i + 1))

/** The comments that keep the labels; none where they are the numbers. */
export const writeNames = (labels: readonly string[]): string[] =>
  isNumbered(labels) ? [] : labels.map((label, i) => `variable ${i + 1}: ${quoteLabel(label)}`)
