import type { Random } from '../../random'

/**
 * A small generator for the inner loops, begun from the attempt's own: one multiplication chain a number, no division
 * and no rejection (the finaliser of splitmix32; Steele, Lea & Flood, OOPSLA 2014). `below` is biased by at most
 * bound / 2³², which no move can notice.
 */
export class Coin {
  private state: number

  constructor(random: Random) {
    this.state = random.uint32() | 0
  }

  /** Uniform in [0, 1), 32 bits. */
  float(): number {
    this.state = (this.state + 0x9e3779b9) | 0
    let z = this.state
    z = Math.imul(z ^ (z >>> 16), 0x21f0aaad)
    z = Math.imul(z ^ (z >>> 15), 0x735a2d97)
    return ((z ^ (z >>> 15)) >>> 0) * 2.3283064365386963e-10
  }

  /** Uniform integer in 0 … bound − 1. */
  below(bound: number): number {
    return (this.float() * bound) | 0
  }
}
