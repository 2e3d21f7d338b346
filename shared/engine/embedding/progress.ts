import type { Control } from '../control'

export type SearchPhase = 'placing' | 'rerouting' | 'shortening'

/** What a running search reports. */
export interface SearchProgress {
  /** Share of the work done, 0 … 1, never falling. */
  readonly fraction: number
  readonly phase: SearchPhase
  /** The try that is running, from 1. */
  readonly tryNumber: number
  readonly tries: number
  /** Σ over qubits of the chains beyond the first, now. */
  readonly overlap: number
  /** Longest chain and total of qubits of the best valid embedding so far. */
  readonly longestChain: number | null
  readonly qubitsUsed: number | null
}

export type StopReason = 'cancelled' | 'timed out'

/** Least time between two reports from within a pass, in seconds. */
const REPORT_INTERVAL = 0.1

/**
 * Watches the clock and the cancellation flag for a search and passes its progress on. Reading the clock never
 * changes what the search does, except to end it.
 */
export class Watch {
  readonly started: number
  stopped: StopReason | null = null
  phase: SearchPhase = 'placing'
  tryNumber = 1
  longestChain: number | null = null
  qubitsUsed: number | null = null
  private fraction = 0
  private lastReport = -Infinity

  constructor(
    private readonly control: Control<SearchProgress>,
    private readonly tries: number,
    private readonly timeLimit: number,
  ) {
    this.started = control.now()
  }

  seconds(): number {
    return this.control.now() - this.started
  }

  /** To be called between two chains. Returns whether the search has to stop. */
  shouldStop(overlap: number): boolean {
    if (this.stopped) return true
    if (this.control.cancelled()) this.stopped = 'cancelled'
    else if (this.seconds() >= this.timeLimit) this.stopped = 'timed out'
    else if (this.control.now() - this.lastReport >= REPORT_INTERVAL) this.report(overlap)
    return this.stopped !== null
  }

  /** Reports now. @param share done of the running try, 0 … 1 */
  report(overlap: number, share = 0): void {
    const { control, tries, tryNumber, phase, longestChain, qubitsUsed } = this
    const done = Math.max((tryNumber - 1 + share) / tries, this.timeLimit > 0 ? this.seconds() / this.timeLimit : 0)
    this.fraction = Math.min(1, Math.max(this.fraction, done))
    this.lastReport = control.now()
    control.report({ fraction: this.fraction, phase, tryNumber, tries, overlap, longestChain, qubitsUsed })
  }
}
