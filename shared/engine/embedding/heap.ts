/**
 * An indexed 4-ary min-heap over the items 0 … capacity − 1 with decrease-key. Keys live in an array that the caller
 * owns, so that one array serves as distance label and as priority. Allocated once; `clear` costs the current size.
 */
export class IndexedHeap {
  size = 0
  private readonly items: Int32Array
  private readonly positions: Int32Array

  constructor(private readonly keys: Float64Array) {
    this.items = new Int32Array(keys.length)
    this.positions = new Int32Array(keys.length).fill(-1)
  }

  clear(): void {
    for (let i = 0; i < this.size; i++) this.positions[this.items[i]!] = -1
    this.size = 0
  }

  /** Inserts the item, or moves it up after its key was lowered. */
  raise(item: number): void {
    let at = this.positions[item]!
    if (at < 0) at = this.size++
    const { items, positions, keys } = this
    const key = keys[item]!
    while (at > 0) {
      const above = (at - 1) >> 2
      const other = items[above]!
      if (keys[other]! <= key) break
      items[at] = other
      positions[other] = at
      at = above
    }
    items[at] = item
    positions[item] = at
  }

  /** Removes and returns an item of least key; the heap must not be empty. */
  pop(): number {
    const { items, positions } = this
    const top = items[0]!
    positions[top] = -1
    const last = items[--this.size]!
    if (this.size > 0) this.sink(last)
    return top
  }

  private sink(item: number): void {
    const { items, positions, keys, size } = this
    const key = keys[item]!
    let at = 0
    for (;;) {
      const first = 4 * at + 1
      if (first >= size) break
      let least = first
      let leastKey = keys[items[first]!]!
      const end = Math.min(first + 4, size)
      for (let child = first + 1; child < end; child++) {
        const childKey = keys[items[child]!]!
        if (childKey < leastKey) {
          least = child
          leastKey = childKey
        }
      }
      if (leastKey >= key) break
      const moved = items[least]!
      items[at] = moved
      positions[moved] = at
      at = least
    }
    items[at] = item
    positions[item] = at
  }
}
