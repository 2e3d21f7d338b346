import type { Bipartition } from './bipartition'
import type { Crossings, RunSet } from './crossings'
import type { Fitter } from './fitter'
import { emptyTemplate, FIRST_ARM, NO_ARM, setMeeting } from './template'
import type { Template } from './template'
import { extentOf } from './windows'

const DEFAULTS = {
  /** Lines of a window for each variable of a side, tried in this order. */
  room: [1, 1.06, 1.15, 1.3, 1.6, 2.5],
  /** Windows of one size looked at, of which the best is fitted. */
  windows: 40,
  /** Runs in a window beyond which it is not looked at, to keep its tables small. */
  mostSlots: 1400,
}

/** The runs that lie in a rectangle, by number. */
interface Rectangle {
  readonly verticals: readonly number[]
  readonly horizontals: readonly number[]
  readonly crossings: number
}

/** Runs that stand in one range of lines and reach into another. */
function runsWithin(set: RunSet, first: number, last: number, alongFirst: number, alongLast: number): number[] {
  const runs: number[] = []
  for (let r = 0; r < set.count; r++)
    if (set.across[r]! >= first && set.across[r]! <= last && set.to[r]! >= alongFirst && set.from[r]! <= alongLast)
      runs.push(r)
  return runs
}

function rectangle(crossings: Crossings, x: number, y: number, width: number, height: number): Rectangle {
  const verticals = runsWithin(crossings.vertical, x, x + width - 1, y, y + height - 1)
  const horizontals = runsWithin(crossings.horizontal, y, y + height - 1, x, x + width - 1)
  let count = 0
  for (const v of verticals)
    for (const h of horizontals) if (crossings.alongVertical[v * crossings.horizontal.count + h]! >= 0) count++
  return { verticals, horizontals, crossings: count }
}

/** Every run a slot: vertical ones in group 0, horizontal ones in group 1. */
function bipartiteTemplate(crossings: Crossings, { verticals, horizontals }: Rectangle): Template {
  const nothing = new Uint32Array(0)
  const armOf = ({ offsets, qubits }: RunSet, r: number): [Uint32Array, Uint32Array] => [
    qubits.subarray(offsets[r]!, offsets[r + 1]!),
    nothing,
  ]
  const template = emptyTemplate([
    ...verticals.map((v) => armOf(crossings.vertical, v)),
    ...horizontals.map((h) => armOf(crossings.horizontal, h)),
  ])
  template.groupOf.fill(1, verticals.length)
  verticals.forEach((v, s) =>
    horizontals.forEach((h, k) => {
      const entry = v * crossings.horizontal.count + h
      if (crossings.alongVertical[entry]! < 0) return
      const place = crossings.alongHorizontal[entry]!
      setMeeting(template, [s, FIRST_ARM, crossings.alongVertical[entry]!], [verticals.length + k, FIRST_ARM, place])
    }),
  )
  return template
}

/** Of the slots first … last − 1 the so many that meet most others, in their order. */
function bestSlots({ slots, armTo }: Template, first: number, last: number, wanted: number): number[] {
  const meetings = new Int32Array(slots)
  for (let s = first; s < last; s++) for (let t = 0; t < slots; t++) if (armTo[s * slots + t] !== NO_ARM) meetings[s]!++
  return Array.from({ length: last - first }, (_, k) => first + k)
    .sort((a, b) => meetings[b]! - meetings[a]! || a - b)
    .slice(0, wanted)
    .sort((a, b) => a - b)
}

/** Fits a problem of two sides: one side's variables take vertical runs, the other's horizontal ones. */
export class BipartiteFitter {
  constructor(
    private readonly fitter: Fitter,
    private readonly crossings: Crossings,
    private readonly sides: Bipartition,
  ) {}

  private bestRectangle(width: number, height: number, upright: number, flat: number): Rectangle | null {
    const { random } = this.fitter.attempt
    const { left, top, width: all, height: down } = extentOf(this.crossings)
    let best: Rectangle | null = null
    for (let k = 0; k < DEFAULTS.windows; k++) {
      const x = left + random.below(Math.max(1, all - width + 1))
      const y = top + random.below(Math.max(1, down - height + 1))
      const found = rectangle(this.crossings, x, y, width, height)
      if (found.verticals.length < upright || found.horizontals.length < flat) continue
      if (found.verticals.length + found.horizontals.length > DEFAULTS.mostSlots) continue
      if (!best || found.crossings > best.crossings) best = found
    }
    return best
  }

  private fitInto(found: Rectangle, verticalSide: number): boolean {
    const { side, sizes } = this.sides
    const template = bipartiteTemplate(this.crossings, found)
    const up = bestSlots(template, 0, found.verticals.length, sizes[verticalSide]!)
    const flat = bestSlots(template, found.verticals.length, template.slots, sizes[1 - verticalSide]!)
    let [nextUp, nextFlat] = [0, 0]
    const slotOf = Int32Array.from(side, (s) => (s === verticalSide ? up[nextUp++]! : flat[nextFlat++]!))
    return this.fitter.fitFrom(template, slotOf)
  }

  /** Offers what can be found in the smallest windows; returns whether anything was valid. */
  run(): boolean {
    const { sizes } = this.sides
    let before = ''
    for (const room of DEFAULTS.room)
      for (const verticalSide of [0, 1] as const) {
        if (this.fitter.attempt.watch.shouldStop(0)) return false
        const { width, height } = extentOf(this.crossings)
        const [upright, flat] = [sizes[verticalSide], sizes[1 - verticalSide]!]
        const [w, h] = [Math.min(width, Math.ceil(upright * room)), Math.min(height, Math.ceil(flat * room))]
        if (before === `${w},${h},${verticalSide}`) continue
        before = `${w},${h},${verticalSide}`
        const found = this.bestRectangle(w, h, upright, flat)
        if (found && this.fitInto(found, verticalSide)) return true
      }
    return false
  }
}
