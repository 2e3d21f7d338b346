/**
 * The growth of a tree of qubits (shared/engine/embedding/chains/grow.ts, `growTree`) on arrays in linear memory, step
 * for step the same, so that both give the same trees. `bind` takes the addresses of the arrays once.
 */
const KEY: f64 = 131072
const FEW_PARTNERS = 6
const FAR = (1 << 30) - 1

let words: i32 = 0
let heapRoom: i32 = 0
let offsets: usize = 0
let targets: usize = 0
let partnerOffsets: usize = 0
let partners: usize = 0
let head: usize = 0
let recordQubit: usize = 0
let recordNext: usize = 0
let nodes: usize = 0
let parent: usize = 0
let labelled: usize = 0
let heap: usize = 0
let touch: usize = 0
let touchedAt: usize = 0
let missing: usize = 0
let tree: usize = 0
let result: usize = 0

function int(array: usize, index: i32): i32 {
  return load<i32>(array + ((<usize>index) << 2))
}

function setInt(array: usize, index: i32, value: i32): void {
  store<i32>(array + ((<usize>index) << 2), value)
}

function float(array: usize, index: i32): f64 {
  return load<f64>(array + ((<usize>index) << 3))
}

function setFloat(array: usize, index: i32, value: f64): void {
  store<f64>(array + ((<usize>index) << 3), value)
}

/** Takes the table of sizes and addresses that `ChainState` in chains/state.ts writes. */
export function bind(table: usize): void {
  words = int(table, 0)
  heapRoom = int(table, 1)
  offsets = int(table, 2)
  targets = int(table, 3)
  partnerOffsets = int(table, 4)
  partners = int(table, 5)
  head = int(table, 6)
  recordQubit = int(table, 7)
  recordNext = int(table, 8)
  nodes = int(table, 9)
  parent = int(table, 10)
  labelled = int(table, 11)
  heap = int(table, 12)
  touch = int(table, 13)
  touchedAt = int(table, 14)
  missing = int(table, 15)
  tree = int(table, 16)
  result = int(table, 17)
}

function push(size: i32, key: f64): void {
  let at = size
  while (at > 0) {
    const above = (at - 1) >> 2
    const other = float(heap, above)
    if (other <= key) break
    setFloat(heap, at, other)
    at = above
  }
  setFloat(heap, at, key)
}

function removeLeast(size: i32): void {
  const last = size - 1
  const key = float(heap, last)
  let at = 0
  for (;;) {
    const first = 4 * at + 1
    if (first >= last) break
    let least = first
    let leastKey = float(heap, first)
    const end = min(first + 4, last)
    for (let child = first + 1; child < end; child++) {
      const childKey = float(heap, child)
      if (childKey < leastKey) {
        least = child
        leastKey = childKey
      }
    }
    if (leastKey >= key) break
    setFloat(heap, at, leastKey)
    at = least
  }
  setFloat(heap, at, key)
}

function dropStale(size: i32): i32 {
  let kept = 0
  for (let i = 0; i < size; i++) {
    const key = float(heap, i)
    const here = floor(key / KEY)
    if (int(nodes, 2 * <i32>(key - here * KEY) + 1) == <i32>here) push(kept++, key)
  }
  return kept
}

function startMissing(variable: i32, start: i32): void {
  const first = int(partnerOffsets, variable)
  const end = int(partnerOffsets, variable + 1)
  for (let w = 0; w < words; w++) setInt(missing, w, 0)
  for (let p = first; p < end; p++) {
    const k = p - first
    if (k == start || int(head, int(partners, p)) < 0) continue
    const word = k >>> 5
    setInt(missing, word, int(missing, word) | (1 << (k & 31)))
  }
}

function reach(qubit: i32): i32 {
  let reached = 0
  for (let w = 0; w < words; w++) {
    const left = int(missing, w)
    const found = int(touch, qubit * words + w) & left
    if (found == 0) continue
    setInt(missing, w, left & ~found)
    reached += popcnt(found)
  }
  return reached
}

function touchesMissing(qubit: i32): bool {
  for (let w = 0; w < words; w++) if ((int(touch, qubit * words + w) & int(missing, w)) != 0) return true
  return false
}

/** As `growTree`; the cost of the tree goes to `result`. */
export function grow(variable: i32, start: i32, placed: i32, ceiling: i32, touchNow: i32): i32 {
  startMissing(variable, start)
  const few = placed <= FEW_PARTNERS
  let left = placed - 1
  let labels = 0
  let size = 0
  let treeSize = 0
  let treeCost = 0
  let bound = min(ceiling, FAR)
  let record = int(head, int(partners, int(partnerOffsets, variable) + start))
  while (record >= 0) {
    const q = int(recordQubit, record)
    const end = int(offsets, q + 1)
    for (let p = int(offsets, q); p < end; p++) {
      const r = int(targets, p)
      const there = int(nodes, 2 * r)
      if (int(nodes, 2 * r + 1) != FAR || there >= bound) continue
      setInt(labelled, labels++, r)
      setInt(nodes, 2 * r + 1, there)
      setInt(parent, r, -1)
      push(size++, <f64>there * KEY + <f64>r)
      if (few && int(touchedAt, r) == touchNow && touchesMissing(r)) bound = there
    }
    record = int(recordNext, record)
  }
  let complete = false
  while (size > 0) {
    const key = float(heap, 0)
    const packed = <i64>key
    const q = <i32>(packed & 131071)
    const here = <i32>(packed >> 17)
    removeLeast(size--)
    if (here != int(nodes, 2 * q + 1)) continue
    if (here > 0 && (left == 0 || int(touchedAt, q) == touchNow)) {
      const reached = left == 0 ? 0 : reach(q)
      if (left == 0 || reached > 0) {
        const first = treeSize
        let r = q
        while (r >= 0 && int(nodes, 2 * r + 1) != 0) {
          setInt(tree, treeSize++, r)
          treeCost += int(nodes, 2 * r)
          r = int(parent, r)
        }
        left -= reached
        if (treeCost >= ceiling) break
        if (left == 0) {
          complete = true
          break
        }
        bound = min(ceiling - treeCost, FAR)
        let from = first
        if (first == 0 || few) {
          for (let i = 0; i < labels; i++) setInt(nodes, 2 * int(labelled, i) + 1, FAR)
          labels = 0
          size = 0
          from = 0
          for (let i = 0; i < treeSize; i++) setInt(labelled, labels++, int(tree, i))
        }
        for (let i = from; i < treeSize; i++) {
          const t = int(tree, i)
          setInt(nodes, 2 * t + 1, 0)
          push(size++, <f64>t)
        }
        continue
      }
    }
    const begin = int(offsets, q)
    const end = int(offsets, q + 1)
    if (size + end - begin > heapRoom) size = dropStale(size)
    for (let p = begin; p < end; p++) {
      const r = int(targets, p)
      const there = here + int(nodes, 2 * r)
      if (there >= bound) continue
      const known = int(nodes, 2 * r + 1)
      if (there >= known) continue
      if (known == FAR) setInt(labelled, labels++, r)
      setInt(nodes, 2 * r + 1, there)
      setInt(parent, r, q)
      push(size++, <f64>there * KEY + <f64>r)
      if (few && int(touchedAt, r) == touchNow && touchesMissing(r)) bound = there
    }
  }
  for (let i = 0; i < labels; i++) setInt(nodes, 2 * int(labelled, i) + 1, FAR)
  setInt(result, 0, treeCost)
  return complete ? treeSize : 0
}
