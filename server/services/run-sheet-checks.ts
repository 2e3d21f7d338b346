import { verifyEmbedding } from '../../shared/engine/embedding/verify'
import { interactionGraph } from '../../shared/engine/problem/interaction-graph'
import { gaugesOutsideRanges } from '../../shared/engine/programming/gauges'
import { scheduleIssues, straightSchedule } from '../../shared/engine/programming/schedule'
import type { Programmed } from '../../shared/engine/programming/programme'
import type { VersionStanding } from '../../shared/schemas/problem-versions'
import type { CheckView, RunSheetSettings, RunSheetView } from '../../shared/schemas/run-sheets'
import type { App } from '../app'
import { calibratedMachine } from './machine-graphs'
import type { Bench, Programming } from './programming'
import { chainsBelowBound } from './programming'

const percent = (share: number): string => `${Math.round(share * 100)} %`

/** What a reviewer looks at first: each check passed, with a caution, or refused. */
export async function checksOf(
  app: App,
  bench: Bench,
  settings: RunSheetSettings,
  programming: Programming,
  programmed: Programmed,
  precision: RunSheetView['precision'],
  ofVersion: VersionStanding,
): Promise<CheckView[]> {
  return [
    rangesCheck(bench, programmed),
    ...gaugeCheck(bench, settings, programmed),
    await embeddingCheck(app, bench),
    ...versionCheck(ofVersion),
    annealCheck(bench, settings),
    strengthCheck(bench, programming),
    ...precisionCheck(precision),
  ]
}

function rangesCheck({ machine }: Bench, { limitedBy, scale }: Programmed): CheckView {
  const figure = limitedBy === 'nothing' ? 'scale 1' : `scale ${Number(scale.toPrecision(3))}, limited by ${limitedBy}`
  return { verdict: 'passed', what: `Every programmed value fits ${machine.machine.name}’s ranges`, figure }
}

function gaugeCheck({ machine }: Bench, { gauges, seed }: RunSheetSettings, programmed: Programmed): CheckView[] {
  const outside = gauges > 1 ? gaugesOutsideRanges(programmed, machine.sheet.ranges, seed, gauges) : 0
  if (outside === 0) return []
  const what = `${outside} of the ${gauges} gauges turn a value out of ${machine.machine.name}’s ranges`
  return [{ verdict: 'caution', what, figure: 'asymmetric ranges: fewer gauges, or another seed' }]
}

async function embeddingCheck(app: App, { machine, row, ising, embedding }: Bench): Promise<CheckView> {
  const current = await calibratedMachine(app, row, machine.machine.id)
  const violations = verifyEmbedding(interactionGraph(ising), current.graph, current.usable, embedding)
  const { number } = current.calibration
  if (violations.length > 0)
    return {
      verdict: 'refused',
      what: `Calibration ${number} broke the embedding`,
      figure: violations.length === 1 ? '1 broken rule' : `${violations.length} broken rules`,
    }
  const figure = machine.calibration.number === number ? 'the one in force' : `made at ${machine.calibration.number}`
  return { verdict: 'passed', what: `The embedding holds at calibration ${number}`, figure }
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

function strengthCheck(bench: Bench, { strengths, bounds }: Programming): CheckView {
  const below = chainsBelowBound(bench, strengths, bounds)
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
