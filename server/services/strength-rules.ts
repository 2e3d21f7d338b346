import type { Problem } from '../../shared/engine/problem/problem'
import type { ControlError } from '../../shared/engine/programming/coefficients'
import { countDrowned, smallestCoefficient } from '../../shared/engine/programming/coefficients'
import type { Programmed } from '../../shared/engine/programming/programme'
import { programmeLayout } from '../../shared/engine/programming/programme'
import { couplingSums } from '../../shared/engine/programming/ranges'
import { chainsBelow } from '../../shared/engine/programming/strength-effects'
import { referenceSize, rmsCoupling, rmsSize, STRENGTH_DEFAULTS } from '../../shared/engine/programming/strength'
import type {
  RuleView,
  RunSheetSettings,
  RunSheetView,
  ScaleLimitView,
  SmallestView,
  Strength,
} from '../../shared/schemas/run-sheets'
import type { Bench, Programming } from './programming'
import { RULE_DEFAULTS, strengthsOf } from './programming'

const figure = (value: number): string => String(Number(value.toPrecision(4)))

function fromOf(rule: Strength['rule'], value: number | undefined, ising: Problem): string {
  if (rule === 'fixed') return `${figure(value!)} × ${figure(referenceSize(ising))}, the largest |J|`
  if (rule === 'rms') return `κ ${figure(value!)} × ${figure(rmsSize(ising))}, r.m.s. of J × √degree`
  if (rule === 'manual') return value === undefined ? 'as entered, per chain' : 'as entered'
  return `${figure(value!)} × the bound of each chain`
}

const TITLES: Record<Strength['rule'], string> = {
  fixed: 'Fixed multiple',
  rms: 'Root-mean-square',
  choi: 'Choi’s bound',
  cut: 'Cut bound',
  manual: 'As entered',
}

/** The coefficient nearest to drowning in control error, or furthest under. */
function smallestView(ising: Problem, scale: number, error: ControlError): SmallestView | null {
  const smallest = smallestCoefficient(ising, scale, error)
  if (!smallest) return null
  const { kind, value } = smallest
  return { kind, value, sigma: kind === 'field' ? error.sigmaH : error.sigmaJ }
}

/** Every strength rule worked out on this embedding, the chosen one with its own value. */
export function compareRules(bench: Bench, settings: RunSheetSettings, { layout, bounds }: Programming): RuleView[] {
  const chosen = settings.strength
  const rules: Strength['rule'][] = [
    'fixed',
    'rms',
    'choi',
    'cut',
    ...(chosen.rule === 'manual' ? (['manual'] as const) : []),
  ]
  const { ranges, controlError } = bench.machine.sheet
  const error = { sigmaH: controlError.h, sigmaJ: controlError.J }
  return rules.map((rule) => {
    const selected = rule === chosen.rule
    const value = (selected ? chosen.value : undefined) ?? (rule === 'manual' ? undefined : RULE_DEFAULTS[rule])
    const { perChain, summary } = strengthsOf(selected ? chosen : { rule, value }, bench, layout)
    const given = { strengths: perChain, ranges, scale: settings.scale ?? ('fit' as const) }
    const { programmed } = programmeLayout(layout, bench.ising, given)
    return {
      rule,
      title: TITLES[rule],
      from: fromOf(rule, value, bench.ising),
      value: value ?? null,
      k: { min: summary.least, max: summary.greatest },
      scale: programmed?.scale ?? 0,
      scaleLimit: programmed ? scaleLimitOf(bench, programmed) : null,
      smallest: programmed ? smallestView(bench.ising, programmed.scale, error) : null,
      coefficients: programmed ? countDrowned(bench.ising, programmed.scale, error) : null,
      chainsBelowCutBound: chainsBelow(layout, perChain, bounds),
      selected,
    }
  })
}

/** The value before scaling that goes furthest beyond its range, where the scale had to come down for one. */
export function scaleLimitOf(bench: Bench, programmed: Programmed): ScaleLimitView | null {
  const { limitedBy: range, scale } = programmed
  if (range === 'nothing') return null
  const { h, J, couplingSum } = bench.machine.sheet.ranges
  const [values, ends] = {
    h: [programmed.h, h] as const,
    J: [programmed.J, J] as const,
    'coupling sum': [couplingSums(programmed), couplingSum!] as const,
  }[range]
  let limit: ScaleLimitView = { range, limit: 1, value: 0 }
  for (const value of values) {
    const end = ends[value < 0 ? 0 : 1]
    if (value / end > (limit.value * scale) / limit.limit) limit = { range, limit: end, value: value / scale }
  }
  return limit
}

/** Figures of the Ising form that strengths are reckoned from. */
export function isingSizes({ ising }: Bench): RunSheetView['ising'] {
  const greatest = (list: Float64Array) => list.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  return {
    variables: ising.n,
    interactions: ising.values.length,
    greatestJ: greatest(ising.values),
    greatestH: greatest(ising.linear),
    rmsJ: rmsCoupling(ising),
    leastShare: STRENGTH_DEFAULTS.leastShare,
  }
}
