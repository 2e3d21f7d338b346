/** A seeded source of random numbers. The same seed gives the same sequence everywhere. */
export interface Random {
  /** Uniform 32-bit unsigned integer. */
  uint32(): number
  /** Uniform in [0, 1), 53 bits. */
  float(): number
  /** Uniform integer in 0 … bound − 1, bound ≤ 2³², without bias. */
  below(bound: number): number
  /** Standard normal deviate. */
  normal(): number
}

/** splitmix32: spreads a small seed over the generator's state (Steele, Lea & Flood, OOPSLA 2014, in its 32-bit form). */
function splitmix(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x9e3779b9) >>> 0
    let z = state
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad)
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97)
    return (z ^ (z >>> 15)) >>> 0
  }
}

/**
 * First streams of the uses of one seed, so far apart that no two uses ever draw the same numbers: the reads of a run, the
 * groups of sixteen that reads are drawn in, the
 * order in which spins are visited, its gauges, its control error, the coins that settle ties, and the
 * lot that leaves rows out.
 */
export const STREAMS = {
  reads: 0,
  groups: 2 ** 26,
  order: 2 ** 27,
  gauges: 2 ** 28,
  controlError: 2 ** 29,
  coins: 2 ** 30,
  rows: 2 ** 31,
} as const

const rotateLeft = (x: number, k: number): number => (x << k) | (x >>> (32 - k))

/**
 * xoshiro128** (Blackman & Vigna, ACM TOMS 47:36, 2021).
 * @param seed any non-negative safe integer
 * @param stream independent streams of one seed, for example one per try or per read
 */
export function createRandom(seed: number, stream = 0): Random {
  const mix = splitmix(seed ^ Math.imul(stream, 0x85ebca6b) ^ Math.floor(seed / 2 ** 32))
  const streamMix = splitmix(stream + 0x1b873593)
  let a = mix() ^ streamMix()
  let b = mix() ^ streamMix()
  let c = mix() ^ streamMix()
  let d = mix() ^ streamMix() || 1
  const uint32 = (): number => {
    const result = Math.imul(rotateLeft(Math.imul(b, 5), 7), 9) >>> 0
    const t = b << 9
    c ^= a
    d ^= b
    b ^= c
    a ^= d
    c ^= t
    d = rotateLeft(d, 11)
    return result
  }
  const float = (): number => ((uint32() >>> 5) * 67108864 + (uint32() >>> 6)) / 9007199254740992
  const below = (bound: number): number => {
    const limit = 4294967296 - (4294967296 % bound)
    let value = uint32()
    while (value >= limit) value = uint32()
    return value % bound
  }
  const normal = (): number => {
    // Marsaglia's polar method, one deviate a call: no state besides the generator's, so streams stay reproducible.
    for (;;) {
      const u = 2 * float() - 1
      const v = 2 * float() - 1
      const s = u * u + v * v
      if (s > 0 && s < 1) return u * Math.sqrt((-2 * Math.log(s)) / s)
    }
  }
  return { uint32, float, below, normal }
}

/** Shuffles in place (Fisher & Yates). */
export function shuffle(items: Int32Array | Uint32Array | number[], random: Pick<Random, 'below'>): void {
  for (let i = items.length - 1; i > 0; i--) {
    const j = random.below(i + 1)
    const moved = items[i]!
    items[i] = items[j]!
    items[j] = moved
  }
}
