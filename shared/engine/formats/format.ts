import type { Control } from '../control'
import type { Form, Problem } from '../problem/problem'

/** `plus`: E = Σ h s + Σ J s s. `minus`: the file means E = −Σ h s − Σ J s s (its offset keeps its sign). */
export type Convention = 'plus' | 'minus'

export type Sense = 'min' | 'max'

/** Where the entries off the diagonal stand; `both`: in both triangles without mirroring each other. */
export type Triangle = 'upper' | 'lower' | 'symmetric' | 'both' | 'diagonal only'

/** What the user says about a file. What is said here beats the file, which beats qubo, plus, min. */
export interface ReadOptions {
  readonly form?: Form
  /** `minus` is for Ising forms only. */
  readonly convention?: Convention
  readonly sense?: Sense
}

/** How far a reading is: bytes of the file as it was given, packed or not. */
export interface ReadingProgress {
  readonly bytes: number
}

export type ReadingControl = Control<ReadingProgress>

/** Why bytes cannot be read on: no text, a damaged archive, a limit, a cancellation. `readProblem` makes an issue of it. */
export class ReadingFault extends Error {
  constructor(
    message: string,
    readonly line?: number,
  ) {
    super(message)
  }
}

/** A problem with its names: labels[i] names variable i; all labels differ. */
export interface ProblemDocument {
  readonly form: Form
  readonly labels: readonly string[]
  /** Always to be minimised, whatever the sense. */
  readonly problem: Problem
  /** The sense the user thinks in; files are written in it. */
  readonly sense: Sense
}

/** A line that was left out, its text cut to a readable length. */
export interface RejectedLine {
  readonly line: number
  readonly text: string
  readonly reason: string
}

/** Why no problem came of the text. */
export interface ReadingIssue {
  readonly line?: number
  readonly message: string
}

/** What was understood of a text. */
export interface ProblemReading {
  /** Identifier of the format it was read as. */
  readonly format: string
  readonly form: Form
  readonly formSource: 'given' | 'file' | 'default'
  readonly convention: Convention
  readonly sense: Sense
  readonly triangle: Triangle
  readonly labels: string[]
  /** To be minimised: convention and sense are already undone. Null exactly when there are issues. */
  readonly problem: Problem | null
  /** Entries beyond the first of a variable or pair, direction disregarded; 0 for a matrix. */
  readonly duplicatesSummed: number
  /** Pairs whose entries came to zero. */
  readonly zerosDropped: number
  /** The first 100 rejected lines. */
  readonly rejected: RejectedLine[]
  readonly rejectedCount: number
  /** The first 100,000 rejected lines as CSV `line,reason,text`; empty when there are none. */
  readonly rejectedList: string
  /** The first 8 entries: labels and value as the file states them, in its own convention and sense. */
  readonly firstRows: [string, string, number][]
  /** Entries accepted; of a matrix, its cells that are not zero. */
  readonly entriesRead: number
  /** The first line when it was taken for column names, else null. */
  readonly header: { readonly line: number; readonly text: string } | null
  readonly issues: ReadingIssue[]
}

/** A format for problems: one module each, all of this shape. */
export interface ProblemFormat {
  readonly id: string
  readonly title: string
  /** File name endings without the point. */
  readonly extensions: readonly string[]
  readonly mediaType: string
  /**
   * How much the beginning of a file looks like this format, 0 … 1.
   * @param head at most 64 KiB, unpacked; of a longer file, cut after a line or field where it has any
   */
  sniff(head: Uint8Array): number
  /**
   * Reads bytes that arrive in chunks, cut anywhere; each chunk is used up before the next is asked for. What is wrong is
   * in `rejected` and `issues`.
   * @throws ReadingFault where reading cannot go on, and what the source throws
   */
  read(chunks: Iterable<Uint8Array>, options: ReadOptions): ProblemReading
  /**
   * A file that reads back to the same document without options, to the last bit.
   * @throws RangeError for labels that cannot be written, or a problem that the format cannot hold
   */
  write(document: ProblemDocument): Uint8Array
}

/** What the beginning of a file looks like: the formats with any likeness, the likeliest first. */
export interface Likeness {
  readonly format: string
  /** 0 … 1 */
  readonly score: number
}

/** A reading of a file, with how its format was found. */
export interface FileReading extends ProblemReading {
  readonly formatSource: 'given' | 'detected'
  readonly likenesses: readonly Likeness[]
  /** What the file was packed in; undone before the format saw it. */
  readonly container: 'gzip' | null
  /** Whether the bytes were read to the end; where they were not, the only issue says why. */
  readonly isReadToEnd: boolean
}
