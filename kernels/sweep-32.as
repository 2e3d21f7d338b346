/**
 * Metropolis sweeps over sixteen replicas at once in 32-bit floating point, four vectors of four that share one generator
 * and each load of a coupling: sweep-16.as with wider lanes. Fields are whole numbers below 2²⁴, so that sums are exact and
 * never drift. Its plain twin, shared/engine/sampling/lanes/plain.ts, gives the same spins.
 */
let levels: i32 = 0
let levelStarts: usize = 0
let recordStarts: usize = 0
let fields: usize = 0
let spins: usize = 0
let changes: usize = 0
let changed: usize = 0
let state: usize = 0

/** Takes the table of sizes and addresses that `assemblyLanes` in lanes/assembly.ts writes. */
export function bind(table: usize): void {
  levels = load<i32>(table)
  levelStarts = load<u32>(table, 4)
  recordStarts = load<u32>(table, 8)
  fields = load<u32>(table, 12)
  spins = load<u32>(table, 16)
  changes = load<u32>(table, 20)
  changed = load<u32>(table, 24)
  state = load<u32>(table, 28)
}

function turn(s: usize, d: v128): void {
  v128.store(s, f32x4.sub(f32x4.sub(v128.load(s), d), d))
}

function push(field: usize, w: v128, d0: v128, d1: v128, d2: v128, d3: v128): void {
  v128.store(field, f32x4.add(v128.load(field), f32x4.mul(w, d0)))
  v128.store(field, f32x4.add(v128.load(field, 16), f32x4.mul(w, d1)), 16)
  v128.store(field, f32x4.add(v128.load(field, 32), f32x4.mul(w, d2)), 32)
  v128.store(field, f32x4.add(v128.load(field, 48), f32x4.mul(w, d3)), 48)
}

/** Carries out the listed flips, as in sweep-16.as; a record is the address of a neighbour's field and −2W. */
function apply(end: usize): void {
  let change = changes
  for (let index = changed; index < end; index += 4, change += 64) {
    const k = <usize>load<u32>(index)
    const d0 = v128.load(change)
    const d1 = v128.load(change, 16)
    const d2 = v128.load(change, 32)
    const d3 = v128.load(change, 48)
    const s = spins + (k << 6)
    turn(s, d0)
    turn(s + 16, d1)
    turn(s + 32, d2)
    turn(s + 48, d3)
    let p = <usize>load<u32>(recordStarts + (k << 2))
    const stop = <usize>load<u32>(recordStarts + (k << 2), 4)
    for (; p < stop; p += 16) {
      push(<usize>load<u32>(p), v128.load32_splat(p, 4), d0, d1, d2, d3)
      push(<usize>load<u32>(p, 8), v128.load32_splat(p, 12), d0, d1, d2, d3)
    }
  }
}

/** Turns up the spins whose bits are set, one word of sixteen replicas a spin; all spins are down and their fields so. */
export function begin(n: i32, words: usize): void {
  const bit = i32x4(1, 2, 4, 8)
  const down = f32x4.splat(-1)
  for (let k = 0; k < n; k++) {
    const word = <i32>load<u16>(words + (<usize>k << 1))
    for (let part = 0; part < 4; part++) {
      const up = i32x4.eq(v128.and(i32x4.splat(word >>> (4 * part)), bit), bit)
      v128.store(changes + (<usize>part << 4), v128.and(up, down))
    }
    store<i32>(changed, k)
    apply(changed + 4)
  }
}

function flips(f: usize, s: v128, threshold: usize, scale: v128): v128 {
  return v128.and(f32x4.gt(f32x4.mul(v128.load(f), s), f32x4.mul(v128.load(threshold), scale)), s)
}

/** Offers every spin one flip. A threshold is the table's entry times the factor; the generator is that of sweep-16.as. */
export function sweep(thresholds: usize, factor: f32): void {
  const scale = f32x4.splat(factor)
  let x = load<u32>(state)
  let y = load<u32>(state, 4)
  let first = load<i32>(levelStarts)
  for (let level = 1; level <= levels; level++) {
    const end = load<i32>(levelStarts + (<usize>level << 2))
    let change = changes
    let index = changed
    for (let k = first; k < end; k++) {
      const f = fields + (<usize>k << 6)
      const s = spins + (<usize>k << 6)
      const draw = rotl<u32>(x * 0x9e3779bb, 5) * 5
      y ^= x
      x = rotl<u32>(x, 26) ^ y ^ (y << 9)
      y = rotl<u32>(y, 13)
      const t0 = thresholds + <usize>((draw >>> 16) << 2)
      const t1 = thresholds + <usize>((draw & 0xffff) << 2)
      const d0 = flips(f, v128.load(s), t0, scale)
      const d1 = flips(f + 16, v128.load(s, 16), t0 + 16, scale)
      const d2 = flips(f + 32, v128.load(s, 32), t1, scale)
      const d3 = flips(f + 48, v128.load(s, 48), t1 + 16, scale)
      v128.store(change, d0)
      v128.store(change, d1, 16)
      v128.store(change, d2, 32)
      v128.store(change, d3, 48)
      store<i32>(index, k)
      const any = <usize>v128.any_true(v128.or(v128.or(d0, d1), v128.or(d2, d3)))
      change += any << 6
      index += any << 2
    }
    apply(index)
    first = end
  }
  store<u32>(state, x)
  store<u32>(state, y, 4)
}
