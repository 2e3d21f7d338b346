import type { SamplerModel } from '../sampling/physical-model'
import { writeLocalFields } from './local-fields'

const ABSENT = -1

/**
 * Greedy descent on one model: flips the spin that lowers the energy most, until none does; the lower index first among
 * equals. The spins that would lower it stand in an indexed binary heap (Williams, Algorithm 232: Heapsort, CACM 7:347,
 * 1964), so that a flip costs O(degree · log candidates) in place of a look at every spin.
 */
export class Descent {
  private readonly fields: Float64Array
  private readonly gains: Float64Array
  /** Candidates in heap order, and the place of each spin; −1 for those that are none. */
  private readonly heap: Int32Array
  private readonly place: Int32Array
  private size = 0

  /** @param leastGain smaller gains are rounding: descent always ends */
  constructor(
    private readonly model: SamplerModel,
    private readonly leastGain: number,
  ) {
    this.fields = new Float64Array(model.n)
    this.gains = new Float64Array(model.n)
    this.heap = new Int32Array(model.n)
    this.place = new Int32Array(model.n).fill(ABSENT)
  }

  /** Lowers the energy of the spins in place. */
  run(spins: Int8Array): void {
    writeLocalFields(this.model, spins, this.fields)
    for (let i = 0; i < this.model.n; i++) this.update(i, spins[i]! * this.fields[i]!)
    // A flipped spin is no candidate any more, so the heap is empty again at the end.
    while (this.size > 0) this.flip(spins, this.heap[0]!)
  }

  private flip(spins: Int8Array, i: number): void {
    const { offsets, targets, weights } = this.model
    const change = -2 * spins[i]!
    spins[i] = -spins[i]!
    this.update(i, -this.gains[i]!)
    for (let p = offsets[i]!; p < offsets[i + 1]!; p++) {
      const j = targets[p]!
      const field = this.fields[j]! + change * weights[p]!
      this.fields[j] = field
      this.update(j, spins[j]! * field)
    }
  }

  /** Puts a spin where its gain belongs: into the heap, elsewhere in it, or out of it. */
  private update(i: number, gain: number): void {
    this.gains[i] = gain
    const at = this.place[i]!
    if (gain > this.leastGain) {
      if (at === ABSENT) this.rise(i, this.size++)
      else this.settle(i, at)
    } else if (at !== ABSENT) {
      this.place[i] = ABSENT
      const last = this.heap[--this.size]!
      if (at < this.size) this.settle(last, at)
    }
  }

  private settle(i: number, at: number): void {
    if (at > 0 && this.isBefore(i, this.heap[(at - 1) >> 1]!)) this.rise(i, at)
    else this.sink(i, at)
  }

  private isBefore(i: number, j: number): boolean {
    const difference = this.gains[i]! - this.gains[j]!
    return difference > 0 || (difference === 0 && i < j)
  }

  private put(i: number, at: number): void {
    this.heap[at] = i
    this.place[i] = at
  }

  private rise(i: number, from: number): void {
    let at = from
    while (at > 0) {
      const above = (at - 1) >> 1
      if (!this.isBefore(i, this.heap[above]!)) break
      this.put(this.heap[above]!, at)
      at = above
    }
    this.put(i, at)
  }

  private sink(i: number, from: number): void {
    const { heap, size } = this
    let at = from
    for (let child = 2 * at + 1; child < size; child = 2 * at + 1) {
      if (child + 1 < size && this.isBefore(heap[child + 1]!, heap[child]!)) child++
      if (!this.isBefore(heap[child]!, i)) break
      this.put(heap[child]!, at)
      at = child
    }
    this.put(i, at)
  }
}
