/**
 * What long engine work is given from outside, so that the engine itself reads no clock and knows no thread:
 * a monotone clock in seconds, a cancellation flag and a place to report to.
 */
export interface Control<P> {
  readonly now: () => number
  readonly cancelled: () => boolean
  readonly report: (progress: P) => void
}
