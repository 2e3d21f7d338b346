import { gaugesOutsideRanges } from '../../shared/engine/programming/gauges'
import { chainsBelow } from '../../shared/engine/programming/strength-effects'
import { scheduleIssues, straightSchedule } from '../../shared/engine/programming/schedule'
import type { Programmed } from '../../shared/engine/programming/programme'
import type { VersionStanding } from '../../shared/schemas/problem-versions'
import type { BrokenView } from '../../shared/schemas/repairs'
import type { CheckView, RunSheetSettings, RunSheetView } from '../../shared/schemas/run-sheets'
import type { Bench, Programming } from './programming'

const percent = (share: number): string => `${Math.round(share * 100)} %`

/** What a reviewer looks at first: each check passed, with a caution, or refused. */
export function checksOf(
  bench: Bench,
  settings: RunSheetSettings,
  programming: Programming,
  programmed: Programmed,
  precision: RunSheetView['precision'],
  ofVersion: VersionStanding,
  embedding: { inForce: number; broken: BrokenView | null },
): CheckView[] {
  return [
    rangesCheck(bench, settings, programmed),
    ...gaugeCheck(bench, settings, programmed),
    embeddingCheck(bench, embedding.inForce, embedding.broken),
    ...versionCheck(ofVersion),
    annealCheck(bench, settings),
    strengthCheck(programming),
    ...precisionCheck(precision),
  ]
}

function rangesCheck({ machine }: Bench, settings: RunSheetSettings, { limitedBy, scale }: Programmed): CheckView {
  if (settings.scale !== null && settings.scale !== scale)
    return {
      verdict: 'refused',
      what: `The chosen scale ${settings.scale} leaves ${machine.machine.name}’s ranges`,
      figure: `at most ${Number(scale.toPrecision(3))} fits: shown with it`,
    }
  const figure = limitedBy === 'nothing' ? 'scale 1' : `scale ${Number(scale.toPrecision(3))}, limited by ${limitedBy}`
  return { verdict: 'passed', what: `Every programmed value fits ${machine.machine.name}’s ranges`, figure }
}

function gaugeCheck({ machine }: Bench, { gauges, seed }: RunSheetSettings, programmed: Programmed): CheckView[] {
  const outside = gauges > 1 ? gaugesOutsideRanges(programmed, machine.sheet.ranges, seed, gauges) : 0
  if (outside === 0) return []
  const what = `${outside} of the ${gauges} gauges turn a value out of ${machine.machine.name}’s ranges`
  return [{ verdict: 'caution', what, figure: 'asymmetric ranges: fewer gauges, or another seed' }]
}

/** What is programmed uses every qubit and coupler of the embedding: one that is missing now is refused. */
function embeddingCheck({ machine }: Bench, inForce: number, broken: BrokenView | null): CheckView {
  if (!broken) {
    const figure = machine.calibration.number === inForce ? 'the one in force' : `made at ${machine.calibration.number}`
    return { verdict: 'passed', what: `The embedding holds at calibration ${inForce}`, figure }
  }
  const { chains, ofChains, qubitsLost, couplersLost } = broken.damage
  const missing = [
    ...(qubitsLost.length > 0 ? [`${qubitsLost.length} qubit${qubitsLost.length === 1 ? '' : 's'}`] : []),
    ...(couplersLost.length > 0 ? [`${couplersLost.length} coupler${couplersLost.length === 1 ? '' : 's'}`] : []),
  ]
  return {
    verdict: 'refused',
    what: `Calibration ${broken.calibration} broke the embedding: ${missing.join(' and ')} of it missing`,
    figure: `${chains} of ${ofChains} chains damaged`,
  }
}

/** Samples answer the version that was programmed, whatever the problem has become since. */
function versionCheck({ version, current }: VersionStanding): CheckView[] {
  if (version === current) return []
  const what = `The embedding was made for version ${version} of the problem: that version is programmed`
  return [{ verdict: 'caution', what, figure: `version ${current} is current` }]
}

function annealCheck({ machine }: Bench, { annealMicroseconds, schedule }: RunSheetSettings): CheckView {
  const { annealMinMicroseconds: least, annealMaxMicroseconds: most } = machine.sheet.timing
  const [issue] = scheduleIssues(schedule ?? straightSchedule(annealMicroseconds), machine.sheet.timing)
  const what = schedule
    ? 'The schedule is within the machine’s limits'
    : 'The anneal time is within the machine’s limits'
  if (!issue) return { verdict: 'passed', what, figure: `${least} to ${most} µs` }
  return {
    verdict: 'refused',
    what: `The ${schedule ? 'schedule' : 'anneal time'} is outside the machine’s limits`,
    figure: schedule ? `point ${issue.point + 1}: ${issue.message}` : issue.message,
  }
}

function strengthCheck({ layout, strengths, bounds }: Programming): CheckView {
  const below = chainsBelow(layout, strengths, bounds)
  return below > 0
    ? {
        verdict: 'caution',
        what: `k is below the cut bound on ${below === 1 ? '1 chain' : `${below} chains`}`,
        figure: 'sufficient, not necessary: rehearse',
      }
    : { verdict: 'passed', what: 'k is above the cut bound on every chain', figure: 'ground states unbroken' }
}

function precisionCheck({ couplingsUnderTwoSigma: share, sigmaJ }: RunSheetView['precision']): CheckView[] {
  if (share === null) return []
  const figure = `σ of J ${sigmaJ}`
  return share > 0
    ? [{ verdict: 'caution', what: `${percent(share)} of the programmed couplings are under 2σ`, figure }]
    : [{ verdict: 'passed', what: 'Every programmed coupling is above 2σ', figure }]
}
