import type { CornerWindow } from './corner-window'
import type { Crossings, RunSet } from './crossings'
import type { Pairing } from './matching'
import { emptyTemplate, FIRST_ARM, SECOND_ARM, setMeeting } from './template'
import type { Template } from './template'

const qubitsOf = ({ offsets, qubits }: RunSet, run: number): Uint32Array =>
  qubits.subarray(offsets[run]!, offsets[run + 1]!)

/** Table entry of the crossing of two runs given by local numbers, −1 where no coupler joins them. */
function entryOf({ crossings, verticals, horizontals }: CornerWindow, v: number, h: number): number {
  const entry = verticals[v]! * crossings.horizontal.count + horizontals[h]!
  return crossings.alongVertical[entry]! < 0 ? -1 : entry
}

function meetAt(
  template: Template,
  crossings: Crossings,
  ofVertical: number,
  ofHorizontal: number,
  entry: number,
): void {
  setMeeting(
    template,
    [ofVertical, FIRST_ARM, crossings.alongVertical[entry]!],
    [ofHorizontal, SECOND_ARM, crossings.alongHorizontal[entry]!],
  )
}

/**
 * The template of a pairing of runs: slot i has a vertical and a horizontal arm. Two slots meet where their runs cross
 * inside the triangle; else where they cross at all; else not.
 */
export function cornerTemplate(window: CornerWindow, { verticals, horizontals }: Pairing): Template {
  const { crossings } = window
  const template = emptyTemplate(
    Array.from(verticals, (v, i) => [
      qubitsOf(crossings.vertical, window.verticals[v]!),
      qubitsOf(crossings.horizontal, window.horizontals[horizontals[i]!]!),
    ]),
  )
  const inside = (v: number, h: number): boolean => window.t[h]! >= window.u[v]!
  for (let i = 0; i < template.slots; i++) {
    const corner = entryOf(window, verticals[i]!, horizontals[i]!)
    if (corner >= 0) {
      template.corners[2 * i] = crossings.alongVertical[corner]!
      template.corners[2 * i + 1] = crossings.alongHorizontal[corner]!
    }
    for (let j = 0; j < i; j++) {
      const one = entryOf(window, verticals[i]!, horizontals[j]!)
      const other = entryOf(window, verticals[j]!, horizontals[i]!)
      const otherIsBetter = !inside(verticals[i]!, horizontals[j]!) && inside(verticals[j]!, horizontals[i]!)
      if (one >= 0 && (other < 0 || !otherIsBetter)) meetAt(template, crossings, i, j, one)
      else if (other >= 0) meetAt(template, crossings, j, i, other)
    }
  }
  return template
}
