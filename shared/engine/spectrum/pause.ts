import type { MinimumGap } from './spectrum'

/**
 * Where to pause: past the least gap, where the gap has opened to kT again. Before it a pause undoes nothing and after
 * it little still moves; that a short way past the least gap serves best was found in experiments on pausing (Marshall,
 * Venturelli, Hen & Rieffel, Phys. Rev. Applied 11:044083, 2019; from memory). Where exactly is our rule, to be tried
 * out on samples.
 * @param s the points of the gap's course
 * @param kT in GHz
 * @returns null where the gap never opens to kT
 */
export function pausePlace(gap: MinimumGap, s: Float64Array, kT: number): number | null {
  if (gap.gigahertz >= kT) return gap.s
  const open = s.findIndex((at, p) => at > gap.s && gap.course[p]! >= kT)
  if (open < 0) return null
  const [before, after] = [gap.course[open - 1]!, gap.course[open]!]
  // From the least gap itself where no point lies between.
  if (s[open - 1]! <= gap.s) return s[open]!
  return s[open - 1]! + ((kT - before) / (after - before)) * (s[open]! - s[open - 1]!)
}
