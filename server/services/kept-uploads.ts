import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Actor } from '../app'
import type { ReadUpload, UploadedFile } from './problem-upload'

const DEFAULTS = {
  /** Smaller files are sent again sooner than they are looked up. */
  fromBytes: 2 ** 18,
  keptMs: 10 * 60_000,
  mostBytes: 256 * 2 ** 20,
}

interface Kept {
  readonly actor: Actor
  readonly file: UploadedFile
  /** The last reading of it, and the options that made it. */
  readonly options: string
  readonly upload: ReadUpload
  readonly bytes: number
  readonly until: number
}

/** Memory of a file and of what was read of it, roughly: the arrays, and labels of some ten characters. */
const bytesOf = (file: UploadedFile, { data }: ReadUpload): number =>
  file.bytes.byteLength + data.problem.values.length * 16 + data.problem.n * 64

/**
 * Files that were looked at but not saved, so that saving them, or reading them in another way, needs no second sending. In
 * the memory of this process alone: one a person, for ten minutes, and no more than 256 MiB in all. Where the file is gone,
 * or another process is asked, it is sent again.
 */
export class KeptUploads {
  private readonly kept = new Map<string, Kept>()

  constructor(private readonly now: () => Date) {}

  /** Keeps a file instead of the person's earlier one; answers its name, or null for a file not worth it. */
  keep(actor: Actor, file: UploadedFile, options: string, upload: ReadUpload): string | null {
    const bytes = bytesOf(file, upload)
    if (file.bytes.byteLength < DEFAULTS.fromBytes || bytes > DEFAULTS.mostBytes) return null
    for (const [id, { actor: owner }] of this.kept)
      if (owner.userId === actor.userId && owner.workspaceId === actor.workspaceId) this.kept.delete(id)
    this.sweep()
    let held = bytes
    for (const other of this.kept.values()) held += other.bytes
    // The oldest go first: a map keeps the order in which they came.
    for (const [id, other] of this.kept) {
      if (held <= DEFAULTS.mostBytes) break
      this.kept.delete(id)
      held -= other.bytes
    }
    const id = randomUUID()
    this.kept.set(id, { actor, file, options, upload, bytes, until: this.now().getTime() + DEFAULTS.keptMs })
    return id
  }

  /** @throws DomainError wrong state, when the file is not kept here or is another person's */
  file(actor: Actor, id: string): UploadedFile {
    this.sweep()
    const kept = this.kept.get(id)
    if (kept && kept.actor.userId === actor.userId && kept.actor.workspaceId === actor.workspaceId) return kept.file
    throw new DomainError('wrong state', 'problem.file-gone', 'The file is no longer kept here. Send it again.')
  }

  /** What was read of a kept file with these options. */
  reading(file: UploadedFile, options: string): ReadUpload | undefined {
    for (const kept of this.kept.values()) if (kept.file === file && kept.options === options) return kept.upload
    return undefined
  }

  /** Forgets what has been kept long enough. */
  sweep(): void {
    for (const [id, { until }] of this.kept) if (until <= this.now().getTime()) this.kept.delete(id)
  }
}
