import type { SamplerModel } from '../sampling/physical-model'
import { writeLocalFields } from './local-fields'

/**
 * Greedy descent on one model: flips the spin that lowers the energy most, until none does; the lower index first among
 * equals. The gains stand in an indexed binary heap (Williams, Algorithm 232: Heapsort, CACM 7:347, 1964), so that a flip
 * costs O(degree · log n) in place of a look at every spin.
 */
export class Descent {
  private readonly fields: Float64Array
  private readonly gains: Float64Array
  /** Spins in heap order, and the place of each. */
  private readonly heap: Uint32Array
  private readonly place: Uint32Array

  /** @param leastGain smaller gains are rounding: descent always ends */
  constructor(
    private readonly model: SamplerModel,
    private readonly leastGain: number,
  ) {
    this.fields = new Float64Array(model.n)
    this.gains = new Float64Array(model.n)
    this.heap = Uint32Array.from({ length: model.n }, (_, i) => i)
    this.place = this.heap.slice()
  }

  /** Lowers the energy of the spins in place. */
  run(spins: Int8Array): void {
    const { model, fields, gains, heap } = this
    if (model.n === 0) return
    writeLocalFields(model, spins, fields)
    for (let i = 0; i < model.n; i++) gains[i] = spins[i]! * fields[i]!
    for (let p = (model.n >> 1) - 1; p >= 0; p--) this.sink(p)
    while (gains[heap[0]!]! > this.leastGain) this.flip(spins, heap[0]!)
  }

  private flip(spins: Int8Array, i: number): void {
    const { model, fields, gains } = this
    const change = -2 * spins[i]!
    spins[i] = -spins[i]!
    gains[i] = -gains[i]!
    this.sink(this.place[i]!)
    for (let p = model.offsets[i]!; p < model.offsets[i + 1]!; p++) {
      const j = model.targets[p]!
      fields[j]! += change * model.weights[p]!
      gains[j] = spins[j]! * fields[j]!
      this.rise(this.place[j]!)
      this.sink(this.place[j]!)
    }
  }

  private isBefore(i: number, j: number): boolean {
    const difference = this.gains[i]! - this.gains[j]!
    return difference > 0 || (difference === 0 && i < j)
  }

  private put(i: number, at: number): void {
    this.heap[at] = i
    this.place[i] = at
  }

  private rise(from: number): void {
    const i = this.heap[from]!
    let at = from
    while (at > 0) {
      const above = (at - 1) >> 1
      if (!this.isBefore(i, this.heap[above]!)) break
      this.put(this.heap[above]!, at)
      at = above
    }
    this.put(i, at)
  }

  private sink(from: number): void {
    const { heap } = this
    const i = heap[from]!
    let at = from
    for (let child = 2 * at + 1; child < heap.length; child = 2 * at + 1) {
      if (child + 1 < heap.length && this.isBefore(heap[child + 1]!, heap[child]!)) child++
      if (!this.isBefore(heap[child]!, i)) break
      this.put(heap[child]!, at)
      at = child
    }
    this.put(i, at)
  }
}
