import { straightSchedule, withPause } from '../../shared/engine/programming/schedule'
import type { AdviceAction } from '../../shared/engine/readout/advice/item'
import type { RunSheetSettings, Strength } from '../../shared/schemas/run-sheets'
import type { Bench } from './programming'
import { programmeBench, RULE_DEFAULTS } from './programming'

const lengthOf = ({ embedding: { offsets } }: Bench, i: number): number => offsets[i + 1]! - offsets[i]!

/** Strengths as entered: the value that most chains of two or more qubits share, and those of the others by name. */
function asEntered(bench: Bench, strengths: Float64Array): Strength {
  const times = new Map<number, number>()
  strengths.forEach((k, i) => {
    if (lengthOf(bench, i) > 1) times.set(k, (times.get(k) ?? 0) + 1)
  })
  const [value] = [...times].reduce((most, one) => (one[1] > most[1] ? one : most))
  const own = bench.labels.flatMap((label, i) =>
    lengthOf(bench, i) > 1 && strengths[i] !== value ? [[label, strengths[i]!]] : [],
  )
  return { rule: 'manual', value, ...(own.length > 0 ? { perChain: Object.fromEntries(own) } : {}) }
}

/** The same rule with another multiple; as entered where a bound would be multiplied by less than 1. */
function timesFactor(bench: Bench, settings: RunSheetSettings, factor: number): Strength {
  const { strength } = settings
  const { strengths } = programmeBench(bench, settings)
  if (strength.rule === 'manual')
    return asEntered(
      bench,
      strengths.map((k) => k * factor),
    )
  const value = (strength.value ?? RULE_DEFAULTS[strength.rule]) * factor
  const isBound = strength.rule === 'choi' || strength.rule === 'cut'
  return isBound && value < 1
    ? asEntered(
        bench,
        strengths.map((k) => k * factor),
      )
    : { rule: strength.rule, value }
}

/** Chains raised to their bound, as the other settings lay them out, times the margin. */
function raised(bench: Bench, settings: RunSheetSettings, variables: readonly number[], margin: number): Strength {
  const {
    strengths,
    bounds: { bound },
  } = programmeBench(bench, settings)
  const next = strengths.slice()
  for (const i of variables) next[i] = Math.max(next[i]!, margin * bound[i]!)
  return asEntered(bench, next)
}

/** A pause as long as the anneal itself, or as the machine leaves time for. */
function paused({ machine }: Bench, settings: RunSheetSettings, s: number): RunSheetSettings {
  const ramp = settings.schedule ?? straightSchedule(settings.annealMicroseconds)
  const room = machine.sheet.timing.annealMaxMicroseconds - settings.annealMicroseconds
  const pause = Math.min(settings.annealMicroseconds, room)
  if (pause <= 0) return settings
  const schedule = withPause(ramp, Number(s.toPrecision(3)), pause)
  return { ...settings, schedule: [...schedule], annealMicroseconds: settings.annealMicroseconds + pause }
}

function applied(bench: Bench, settings: RunSheetSettings, action: AdviceAction): RunSheetSettings {
  if (!('set' in action)) return settings
  switch (action.set) {
    case 'interaction couplers':
      return { ...settings, interactionCouplers: action.to }
    case 'scale':
      return { ...settings, scale: null }
    case 'gauges':
      return { ...settings, gauges: action.to }
    case 'reads':
      return { ...settings, reads: action.to }
    case 'pause':
      return paused(bench, settings, action.s)
    case 'strength of all':
      return { ...settings, strength: timesFactor(bench, settings, action.factor) }
    case 'strength of chains':
      return { ...settings, strength: raised(bench, settings, action.variables, action.margin) }
  }
}

/** Named chains come last: they are raised above what all others make of their bounds. */
const ORDER = ['interaction couplers', 'scale', 'gauges', 'reads', 'pause', 'strength of all', 'strength of chains']

/** The settings with advice followed. A chosen scale that no longer fits the ranges is given up for the one that does. */
export function withAdvice(
  bench: Bench,
  settings: RunSheetSettings,
  actions: readonly AdviceAction[],
): RunSheetSettings {
  const place = (action: AdviceAction): number => ('set' in action ? ORDER.indexOf(action.set) : -1)
  const next = actions
    .toSorted((a, b) => place(a) - place(b))
    .reduce((so, action) => applied(bench, so, action), settings)
  const fits = next.scale === null || programmeBench(bench, next).result.programmed !== null
  return fits ? next : { ...next, scale: null }
}
