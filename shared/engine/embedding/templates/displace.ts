import type { Random } from '../../random'
import type { Watch } from '../progress'
import type { ChainSet } from './chain-set'
import { FREE } from './chain-set'
import type { Joiner } from './join'
import { thinChains } from './thin'

const DEFAULTS = {
  /** Ways tried through the qubits of other chains before giving up, and those in a row that change nothing. */
  tries: 240,
  idle: 16,
  /** Length that a qubit of another chain counts for on a path. */
  foreignLength: 3,
}

/** Opens ways for two chains through a third, which gives up qubits that it can do without and is joined up again. */
export class Displacer {
  private readonly parent: Int32Array
  private readonly distance: Int32Array

  constructor(
    private readonly set: ChainSet,
    private readonly joiner: Joiner,
  ) {
    this.parent = new Int32Array(set.machine.order)
    this.distance = new Int32Array(set.machine.order)
  }

  /** Length that the qubit counts for, 0 where no path may go. */
  private lengthOf(qubit: number): number {
    const { set } = this
    const owner = set.owner[qubit]!
    if (owner === FREE) return 1
    return owner >= 0 && set.chains[owner]!.length > 1 && set.isRemovable(qubit) ? DEFAULTS.foreignLength : 0
  }

  /** Dijkstra with one bucket a length (Dial 1969); returns the qubits between chains i and j, from j's side. */
  private path(i: number, j: number): number[] | null {
    const { set, parent, distance } = this
    const { machine, owner } = set
    distance.fill(1 << 30)
    const buckets: number[][] = [[...set.chains[i]!]]
    for (const q of buckets[0]!) distance[q] = 0
    for (let d = 0; d < buckets.length; d++)
      for (const q of buckets[d] ?? []) {
        if (distance[q] !== d) continue
        for (let p = machine.offsets[q]!; p < machine.offsets[q + 1]!; p++) {
          const r = machine.targets[p]!
          if (owner[r] === j) return this.walkBack(q, i)
          if (distance[r]! <= d + 1) continue
          const length = this.lengthOf(r)
          if (length === 0 || distance[r]! <= d + length) continue
          distance[r] = d + length
          parent[r] = q
          ;(buckets[d + length] ??= []).push(r)
        }
      }
    return null
  }

  private walkBack(end: number, i: number): number[] {
    const path: number[] = []
    for (let q = end; this.set.owner[q] !== i; q = this.parent[q]!) path.push(q)
    return path
  }

  /** Frees the qubits of a path; false when a chain would fall apart. */
  private clear(path: readonly number[]): boolean {
    const { set } = this
    for (const q of path) {
      const owner = set.owner[q]!
      if (owner === FREE) continue
      if (set.chains[owner]!.length < 2 || !set.isRemovable(q)) return false
      set.remove(owner, q)
    }
    return true
  }

  /** Makes the two chains of an unmet interaction touch and mends what breaks by it; returns how many are unmet then. */
  private force(edge: number, random: Random): number {
    const { set, joiner } = this
    const [i, j] = [set.problem.ends[2 * edge]!, set.problem.ends[2 * edge + 1]!]
    const path = this.path(i, j)
    if (!path || !this.clear(path)) return Infinity
    const half = path.length >> 1
    path.forEach((q, k) => set.add(k < half ? j : i, q))
    return joiner.joinAll(random)
  }

  /**
   * Goes on for as long as interactions are unmet and it helps: a try that leaves more of them unmet is taken back.
   * @returns the number of interactions that stay unmet
   */
  run(random: Random, watch: Watch): number {
    const { set } = this
    let unmet = set.unmet()
    let kept = set.copy()
    for (let tries = 0, idle = 0; unmet.length > 0 && tries < DEFAULTS.tries && idle < DEFAULTS.idle; tries++) {
      if (watch.shouldStop(unmet.length)) break
      const left = this.force(unmet[random.below(unmet.length)]!, random)
      if (left > unmet.length) {
        set.restore(kept)
        idle++
        continue
      }
      idle = left < unmet.length ? 0 : idle + 1
      thinChains(set)
      unmet = set.unmet()
      kept = set.copy()
    }
    return unmet.length
  }
}
