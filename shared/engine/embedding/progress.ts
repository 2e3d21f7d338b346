import type { Control } from '../control'
import type { Method } from './method'
import type { Quality } from './objective'

export type SearchPhase =
  'placing' | 'rerouting' | 'assigning lines' | 'fitting the template' | 'repairing' | 'shortening'

/** What a running try reports. */
export interface SearchProgress {
  readonly method: Method
  /** The try that is running, from 1. */
  readonly tryNumber: number
  readonly phase: SearchPhase
  /** Share of this try that is done, 0 … 1, never falling. An estimate. */
  readonly fraction: number
  /** Σ over qubits of the chains beyond the first, now. */
  readonly overlap: number
  /** Longest chain and total of qubits of this try's best valid embedding so far. */
  readonly longestChain: number | null
  readonly qubitsUsed: number | null
  /** Chains of that embedding that a repair changed; 0 otherwise. */
  readonly changed: number
  /** Seconds since the try began. */
  readonly seconds: number
}

export type StopReason = 'cancelled' | 'timed out' | 'target reached'

/** Least time between two reports from within a pass, in seconds. */
const REPORT_INTERVAL = 0.1

/**
 * Watches the clock and the cancellation flag for one try and passes its progress on. Reading the clock never changes
 * what the try does, except to end it.
 */
export class Watch {
  readonly started: number
  stopped: StopReason | null = null
  phase: SearchPhase = 'placing'
  best: Quality | null = null
  private fraction = 0
  private lastReport = -Infinity

  constructor(
    private readonly control: Control<SearchProgress>,
    private readonly method: Method,
    private readonly tryNumber: number,
    private readonly timeLimit: number,
  ) {
    this.started = control.now()
  }

  seconds(): number {
    return this.control.now() - this.started
  }

  /** To be called every few milliseconds. Returns whether the try has to stop. */
  shouldStop(overlap: number): boolean {
    if (this.stopped) return true
    const { control } = this
    const now = control.now()
    if (control.cancelled()) this.stopped = 'cancelled'
    else if (now - this.started >= this.timeLimit) this.stopped = 'timed out'
    else if (now - this.lastReport >= REPORT_INTERVAL) this.report(overlap)
    return this.stopped !== null
  }

  /** Reports now. @param share done of the try, 0 … 1 */
  report(overlap: number, share = 0): void {
    const { control, method, tryNumber, phase, best, timeLimit } = this
    const seconds = this.seconds()
    this.fraction = Math.min(1, Math.max(this.fraction, share, seconds / timeLimit))
    this.lastReport = control.now()
    control.report({
      method,
      tryNumber,
      phase,
      fraction: this.fraction,
      overlap,
      longestChain: best?.longest ?? null,
      qubitsUsed: best?.total ?? null,
      changed: best?.changed ?? 0,
      seconds,
    })
  }
}
