import { groupDigits } from '../../../shared/engine/digits'
import type { Objective, Quality } from '../../../shared/engine/embedding/objective'
import { compareQuality } from '../../../shared/engine/embedding/objective'
import type { SearchProgress } from '../../../shared/engine/embedding/progress'
import type { PlannedTry } from '../../../shared/engine/embedding/plan'
import type { EmbeddingProgress } from '../../../shared/schemas/embeddings'
import { Trace } from './trace'

/** Puts the reports of tries that run at the same time together. */
export class SearchMonitor {
  /** The newest report of each try at work. */
  private readonly atWork = new Map<number, SearchProgress | null>()
  private readonly trace = new Trace()
  private best: Quality | null = null
  private last: SearchProgress | null = null
  private done = 0
  /** Share of the search that is done, 0 … 1, never falling. */
  fraction = 0

  constructor(
    private readonly tries: number,
    private readonly objective: Objective,
    private readonly timeLimitSeconds: number,
  ) {}

  began({ tryNumber }: PlannedTry): void {
    this.atWork.set(tryNumber, null)
  }

  /**
   * @param quality of the embedding that the try ended with
   * @param seconds since the search began
   * @returns null as long as no try has reported
   */
  ended({ tryNumber }: PlannedTry, quality: Quality | null, seconds: number): EmbeddingProgress | null {
    this.atWork.delete(tryNumber)
    this.done++
    if (quality) this.takeBest(quality)
    return this.last && this.progress(this.last, seconds)
  }

  /** @param seconds since the search began */
  report(report: SearchProgress, seconds: number): EmbeddingProgress {
    const { tryNumber, longestChain, qubitsUsed, changed } = report
    if (this.atWork.has(tryNumber)) this.atWork.set(tryNumber, report)
    if (longestChain !== null && qubitsUsed !== null)
      this.takeBest({ longest: longestChain, total: qubitsUsed, changed })
    this.last = report
    return this.progress(report, seconds)
  }

  message({ running, phase, overlap, longestChain, qubitsUsed }: EmbeddingProgress): string {
    const best =
      longestChain === null
        ? 'none valid yet'
        : `best so far: longest chain ${groupDigits(longestChain)}, ${groupDigits(qubitsUsed!)} qubits`
    return `${this.done} of ${this.tries} tries done, ${running} at work, ${phase}, overlap ${groupDigits(overlap)}; ${best}`
  }

  private progress({ method, tryNumber, phase, overlap }: SearchProgress, seconds: number): EmbeddingProgress {
    const { tries } = this
    const reports = [...this.atWork.values()].filter((report) => report !== null)
    const inHand = reports.reduce((sum, { fraction }) => sum + fraction, this.done)
    this.fraction = Math.min(1, Math.max(this.fraction, inHand / tries, seconds / this.timeLimitSeconds))
    const figures = { longestChain: this.best?.longest ?? null, qubitsUsed: this.best?.total ?? null }
    const leastOverlap = reports.reduce((least, report) => Math.min(least, report.overlap), overlap)
    this.trace.add({ seconds, overlap: leastOverlap, ...figures })
    const running = this.atWork.size
    return { method, tryNumber, phase, overlap, tries, running, ...figures, seconds, trace: this.trace.all() }
  }

  private takeBest(quality: Quality): void {
    if (!this.best || compareQuality(quality, this.best, this.objective) < 0) this.best = quality
  }
}
