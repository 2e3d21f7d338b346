import { gaugesOutsideRanges } from '../../shared/engine/programming/gauges'
import { chainsBelow } from '../../shared/engine/programming/strength-effects'
import { scheduleIssues, straightSchedule } from '../../shared/engine/programming/schedule'
import type { Programmed } from '../../shared/engine/programming/programme'
import type { VersionStanding } from '../../shared/schemas/problem-versions'
import type { BrokenView } from '../../shared/schemas/repairs'
import type { CheckView, RunSheetView } from '../../shared/schemas/run-sheets'
import { FIXED_STATES } from '../../shared/schemas/run-sheets'
import type { ReferenceRow } from '../database/repositories/reference-optima'
import type { ReturnRow, RunSheetRow } from '../database/repositories/run-sheets'
import type { Bench, Programming } from './programming'
import { programmeBench } from './programming'
import { rehearsalCheck } from './rehearsed'

const percent = (share: number): string => `${Math.round(share * 100)} %`
const figureOf = (value: number): string => String(Number(value.toPrecision(3)))

/** What the checks of a run sheet look at. */
export interface Checked {
  bench: Bench
  row: RunSheetRow
  programming: Programming
  programmed: Programmed
  precision: RunSheetView['precision']
  ofVersion: VersionStanding
  embedding: { inForce: number; broken: BrokenView | null }
  time: RunSheetView['machineTime']
  budget: RunSheetView['budget']
  returned: readonly ReturnRow[]
  /** The best known value of the version that is programmed. */
  reference: ReferenceRow | undefined
}

/** What a reviewer looks at first: each check passed, with a caution, or refused, and where to go about it. */
export const checksOf = (checked: Checked): CheckView[] => [
  rangesCheck(checked),
  ...scaleCheck(checked),
  ...gaugeCheck(checked),
  embeddingCheck(checked),
  ...versionCheck(checked),
  annealCheck(checked),
  strengthCheck(checked),
  ...precisionCheck(checked),
  rehearsalCheck(checked.row, checked.returned),
  referenceCheck(checked),
  ...priceCheck(checked),
  ...budgetCheck(checked),
]

function rangesCheck({ bench, row: { settings }, programmed: { limitedBy, scale } }: Checked): CheckView {
  const { name } = bench.machine.machine
  const place = { about: 'ranges', at: '#field-scale' } as const
  if (settings.scale !== null && settings.scale !== scale)
    return {
      ...place,
      verdict: 'refused',
      what: `The chosen scale ${settings.scale} leaves ${name}’s ranges`,
      figure: `at most ${figureOf(scale)} fits: shown with it`,
    }
  const figure =
    limitedBy === 'nothing' ? `scale ${figureOf(scale)}` : `scale ${figureOf(scale)}, limited by ${limitedBy}`
  return { ...place, verdict: 'passed', what: `Every programmed value fits ${name}’s ranges`, figure }
}

/** A chosen scale below this share of the one that fits gives precision away. */
const NEAR_RANGE = 0.8

function scaleCheck({ bench, row: { settings }, programmed }: Checked): CheckView[] {
  if (settings.scale === null || settings.scale !== programmed.scale) return []
  const fitting = programmeBench(bench, { ...settings, scale: null }).result.programmed?.scale ?? programmed.scale
  const place = { about: 'scale', at: '#field-scale' } as const
  const figure = `${figureOf(programmed.scale)} of ${figureOf(fitting)}`
  const share = programmed.scale / fitting
  return share < NEAR_RANGE
    ? [{ ...place, verdict: 'caution', what: `The chosen scale is ${percent(share)} of what fits`, figure }]
    : [{ ...place, verdict: 'passed', what: 'The chosen scale is near the largest that fits', figure }]
}

function gaugeCheck({ bench: { machine }, row: { settings }, programmed }: Checked): CheckView[] {
  const { gauges, seed } = settings
  const outside = gauges > 1 ? gaugesOutsideRanges(programmed, machine.sheet.ranges, seed, gauges) : 0
  if (outside === 0) return []
  const what = `${outside} of the ${gauges} gauges turn a value out of ${machine.machine.name}’s ranges`
  const figure = 'asymmetric ranges: fewer gauges, or another seed'
  return [{ about: 'gauges', at: '#field-gauges', verdict: 'caution', what, figure }]
}

/** What is programmed uses every qubit and coupler of the embedding: one that is missing now is refused. */
function embeddingCheck({ bench: { machine }, embedding: { inForce, broken } }: Checked): CheckView {
  const place = { about: 'embedding', at: '#origin' } as const
  if (!broken) {
    const figure = machine.calibration.number === inForce ? 'the one in force' : `made at ${machine.calibration.number}`
    return { ...place, verdict: 'passed', what: `The embedding holds at calibration ${inForce}`, figure }
  }
  const { chains, ofChains, qubitsLost, couplersLost } = broken.damage
  const missing = [
    ...(qubitsLost.length > 0 ? [`${qubitsLost.length} qubit${qubitsLost.length === 1 ? '' : 's'}`] : []),
    ...(couplersLost.length > 0 ? [`${couplersLost.length} coupler${couplersLost.length === 1 ? '' : 's'}`] : []),
  ]
  return {
    ...place,
    verdict: 'refused',
    what: `Calibration ${broken.calibration} broke the embedding: ${missing.join(' and ')} of it missing`,
    figure: `${chains} of ${ofChains} chains damaged`,
  }
}

/** Samples answer the version that was programmed, whatever the problem has become since. */
function versionCheck({ ofVersion: { version, current } }: Checked): CheckView[] {
  if (version === current) return []
  const what = `The embedding was made for version ${version} of the problem: that version is programmed`
  return [{ about: 'version', at: '#origin', verdict: 'caution', what, figure: `version ${current} is current` }]
}

function annealCheck({ bench: { machine }, row: { settings } }: Checked): CheckView {
  const { annealMicroseconds, schedule } = settings
  const { annealMinMicroseconds: least, annealMaxMicroseconds: most } = machine.sheet.timing
  const [issue] = scheduleIssues(schedule ?? straightSchedule(annealMicroseconds), machine.sheet.timing)
  const place = { about: 'schedule', at: schedule ? '#schedule' : '#field-annealMicroseconds' } as const
  const thing = schedule ? 'schedule' : 'anneal time'
  if (!issue) {
    const what = `The ${thing} is within the machine’s limits`
    return { ...place, verdict: 'passed', what, figure: `${least} to ${most} µs` }
  }
  return {
    ...place,
    verdict: 'refused',
    what: `The ${thing} is outside the machine’s limits`,
    figure: schedule ? `point ${issue.point + 1}: ${issue.message}` : issue.message,
  }
}

function strengthCheck({ programming: { layout, strengths, bounds } }: Checked): CheckView {
  const below = chainsBelow(layout, strengths, bounds)
  const place = { about: 'strength', at: '#strength' } as const
  return below > 0
    ? {
        ...place,
        verdict: 'caution',
        what: `k is below the cut bound on ${below === 1 ? '1 chain' : `${below} chains`}`,
        figure: 'sufficient, not necessary: rehearse',
      }
    : { ...place, verdict: 'passed', what: 'k is above the cut bound on every chain', figure: 'ground states unbroken' }
}

function precisionCheck({ precision: { couplingsUnderTwoSigma: share, sigmaJ } }: Checked): CheckView[] {
  if (share === null) return []
  const rest = { about: 'precision', at: '#precision', figure: `σ of J ${sigmaJ}` } as const
  return share > 0
    ? [{ ...rest, verdict: 'caution', what: `${percent(share)} of the programmed couplings are under 2σ` }]
    : [{ ...rest, verdict: 'passed', what: 'Every programmed coupling is above 2σ' }]
}

function referenceCheck({ bench: { problem }, ofVersion, reference }: Checked): CheckView {
  const version = ofVersion.version === ofVersion.current ? '' : `?version=${ofVersion.version}`
  const place = { about: 'reference', at: `/problems/${problem.id}${version}#optimum` } as const
  if (!reference) {
    const figure = 'success probability and time to solution need one'
    return { ...place, verdict: 'caution', what: 'No reference optimum is known', figure }
  }
  return reference.proved
    ? { ...place, verdict: 'passed', what: 'The optimum is known and proved', figure: reference.method ?? '' }
    : { ...place, verdict: 'passed', what: 'A best value to hold samples against is known', figure: 'not proved' }
}

function priceCheck({ time: { price } }: Checked): CheckView[] {
  if (!price) return []
  const { perSecond, currency, amount } = price
  const text = amount >= 1 ? amount.toFixed(2) : String(Number(amount.toPrecision(2)))
  const figure = `${perSecond} ${currency} a second`
  return [
    {
      about: 'price',
      at: '#machine-time',
      verdict: 'passed',
      what: `About ${text} ${currency} of machine time`,
      figure,
    },
  ]
}

/** From approval on its time is held: only before it is there something to compare. */
function budgetCheck({ bench: { machine }, row: { state }, time, budget }: Checked): CheckView[] {
  if (!budget || budget.heldSeconds > 0 || FIXED_STATES.includes(state)) return []
  const place = { about: 'budget', at: '#machine-time' } as const
  const figure = `${figureOf(budget.leftSeconds)} s left for ${machine.machine.name}`
  return time.totalMilliseconds <= 1000 * budget.leftSeconds
    ? [{ ...place, verdict: 'passed', what: 'The machine time is within the budget', figure }]
    : [{ ...place, verdict: 'caution', what: 'The budget is too small: it cannot be approved', figure }]
}
