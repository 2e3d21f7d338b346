/**
 * Metropolis sweeps over sixteen replicas at once in 16-bit arithmetic, two vectors of eight that share one generator and
 * each load of a coupling (shared/engine/sampling/lanes). Its plain twin, lanes/plain.ts, gives the same spins.
 *
 * Spins of a level are no neighbours of one another, so a level is first judged as a whole and without branches: flips are
 * put on a list, and where none of the sixteen replicas flips the list's end stays where it is. Then the list is carried out.
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

/**
 * Carries out the listed flips. A change is the spin before the flip, 0 in replicas that keep it; a record is the address
 * of a neighbour's field and −2W twice. Records come in pairs, so two are taken at once.
 */
function apply(end: usize): void {
  let change = changes
  for (let index = changed; index < end; index += 4, change += 32) {
    const k = <usize>load<u32>(index)
    const d0 = v128.load(change)
    const d1 = v128.load(change, 16)
    const s = spins + (k << 5)
    v128.store(s, i16x8.sub(i16x8.sub(v128.load(s), d0), d0))
    v128.store(s, i16x8.sub(i16x8.sub(v128.load(s, 16), d1), d1), 16)
    let p = <usize>load<u32>(recordStarts + (k << 2))
    const stop = <usize>load<u32>(recordStarts + (k << 2), 4)
    for (; p < stop; p += 16) {
      const a = <usize>load<u32>(p)
      const w = v128.load32_splat(p, 4)
      v128.store(a, i16x8.add(v128.load(a), i16x8.mul(w, d0)))
      v128.store(a, i16x8.add(v128.load(a, 16), i16x8.mul(w, d1)), 16)
      const b = <usize>load<u32>(p, 8)
      const v = v128.load32_splat(p, 12)
      v128.store(b, i16x8.add(v128.load(b), i16x8.mul(v, d0)))
      v128.store(b, i16x8.add(v128.load(b, 16), i16x8.mul(v, d1)), 16)
    }
  }
}

/** Turns up the spins whose bits are set, one word of sixteen replicas a spin; all spins are down and their fields so. */
export function begin(n: i32, words: usize): void {
  const bit = i16x8(1, 2, 4, 8, 16, 32, 64, 128)
  for (let k = 0; k < n; k++) {
    const word = <i32>load<u16>(words + (<usize>k << 1))
    v128.store(changes, i16x8.eq(v128.and(i16x8.splat(<i16>(word & 255)), bit), bit))
    v128.store(changes, i16x8.eq(v128.and(i16x8.splat(<i16>(word >>> 8)), bit), bit), 16)
    store<i32>(changed, k)
    apply(changed + 4)
  }
}

/**
 * Offers every spin one flip. A threshold is the table's entry times factor / 32768, doubled so many times and less the
 * bias, both saturating; the generator is xoroshiro64** (Blackman & Vigna 2021), its two halves the places in the table.
 */
export function sweep(thresholds: usize, factor: i32, doublings: i32, bias: i32): void {
  const scale = i16x8.splat(<i16>factor)
  const shift = i16x8.splat(<i16>bias)
  let x = load<u32>(state)
  let y = load<u32>(state, 4)
  let first = load<i32>(levelStarts)
  for (let level = 1; level <= levels; level++) {
    const end = load<i32>(levelStarts + (<usize>level << 2))
    let change = changes
    let index = changed
    for (let k = first; k < end; k++) {
      const f = fields + (<usize>k << 5)
      const s = spins + (<usize>k << 5)
      const draw = rotl<u32>(x * 0x9e3779bb, 5) * 5
      y ^= x
      x = rotl<u32>(x, 26) ^ y ^ (y << 9)
      y = rotl<u32>(y, 13)
      let t0 = i16x8.q15mulr_sat_s(v128.load(thresholds + <usize>((draw >>> 16) << 1)), scale)
      let t1 = i16x8.q15mulr_sat_s(v128.load(thresholds + <usize>((draw & 0xffff) << 1)), scale)
      for (let j = 0; j < doublings; j++) {
        t0 = i16x8.add_sat_s(t0, t0)
        t1 = i16x8.add_sat_s(t1, t1)
      }
      const s0 = v128.load(s)
      const s1 = v128.load(s, 16)
      const d0 = v128.and(i16x8.gt_s(i16x8.mul(v128.load(f), s0), i16x8.sub_sat_s(t0, shift)), s0)
      const d1 = v128.and(i16x8.gt_s(i16x8.mul(v128.load(f, 16), s1), i16x8.sub_sat_s(t1, shift)), s1)
      v128.store(change, d0)
      v128.store(change, d1, 16)
      store<i32>(index, k)
      const any = <usize>v128.any_true(v128.or(d0, d1))
      change += any << 5
      index += any << 2
    }
    apply(index)
    first = end
  }
  store<u32>(state, x)
  store<u32>(state, y, 4)
}
