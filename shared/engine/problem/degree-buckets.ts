/** Vertices by degree in doubly linked lists: the least degree is at hand, and changing one takes constant time. */
export class DegreeBuckets {
  /** Degree of each vertex that has not been removed. */
  readonly degree: Int32Array
  /** Vertices not yet removed. */
  count: number
  private readonly first: Int32Array
  private readonly next: Int32Array
  private readonly previous: Int32Array
  /** No bucket below is filled. */
  private least = 0

  constructor(degrees: Int32Array) {
    this.degree = degrees
    this.count = degrees.length
    this.first = new Int32Array(degrees.length + 1).fill(-1)
    this.next = new Int32Array(degrees.length)
    this.previous = new Int32Array(degrees.length)
    for (let v = degrees.length - 1; v >= 0; v--) this.link(v)
  }

  /** A vertex of least degree; there must be one. */
  leastVertex(): number {
    while (this.first[this.least]! < 0) this.least++
    return this.first[this.least]!
  }

  /** The second smallest degree, the smallest when two vertices share it; 0 with fewer than two vertices. */
  secondDegree(): number {
    if (this.count < 2) return 0
    let degree = this.degree[this.leastVertex()]!
    if (this.next[this.first[degree]!]! >= 0) return degree
    do degree++
    while (this.first[degree]! < 0)
    return degree
  }

  remove(v: number): void {
    this.unlink(v)
    this.count--
  }

  change(v: number, by: number): void {
    this.unlink(v)
    this.degree[v]! += by
    this.link(v)
  }

  private link(v: number): void {
    const degree = this.degree[v]!
    const after = this.first[degree]!
    this.next[v] = after
    this.previous[v] = -1
    if (after >= 0) this.previous[after] = v
    this.first[degree] = v
    if (degree < this.least) this.least = degree
  }

  private unlink(v: number): void {
    const before = this.previous[v]!
    const after = this.next[v]!
    if (before >= 0) this.next[before] = after
    else this.first[this.degree[v]!] = after
    if (after >= 0) this.previous[after] = before
  }
}
