import { csvCell } from '../../shared/csv'
import { drownedCoefficients, countDrowned, sharesOf } from '../../shared/engine/programming/coefficients'
import type { ScaledCoefficient, Shares } from '../../shared/engine/programming/coefficients'
import type { Programmed } from '../../shared/engine/programming/programme'
import { strengthEffects } from '../../shared/engine/programming/strength-effects'
import { valueCounts } from '../../shared/engine/programming/value-counts'
import type { DrownedView, PrecisionView, StrengthEffectView } from '../../shared/schemas/precision'
import type { RunSheetSettings } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import { controlErrorOf } from './precision'
import type { Bench, Programming } from './programming'
import { programmeShown, requireProgrammed } from './programming'
import { benchOf, runSheetRow } from './run-sheets'

/** Coefficients that the page lists; the file has all. */
const LISTED = 50

interface Shown {
  number: number
  bench: Bench
  settings: RunSheetSettings
  programming: Programming
  programmed: Programmed
}

async function load(app: App, actor: Actor, id: string): Promise<Shown> {
  const row = await runSheetRow(app, actor, id)
  const bench = await benchOf(app, actor, row)
  const programming = programmeShown(bench, row.settings)
  const programmed = requireProgrammed(programming)
  return { number: row.number, bench, settings: row.settings, programming, programmed }
}

const drownedView = (
  { ising, labels }: Bench,
  { kind, at, value, size, perSigma }: ScaledCoefficient,
  shares: Shares,
): DrownedView => {
  const figures = { value, size, perSigma }
  if (kind === 'field') return { of: [labels[at]!], ...figures, parts: shares.ofField[at]! }
  return { of: [labels[ising.rows[at]!]!, labels[ising.cols[at]!]!], ...figures, parts: shares.ofInteraction[at]! }
}

function effectsOf({ bench, settings, programming }: Shown): StrengthEffectView[] {
  const { layout, strengths, bounds } = programming
  const held = strengths.filter((_, i) => layout.chainLength[i]! > 1)
  const least = held.reduce((a, b) => Math.min(a, b), Infinity)
  const most = held.reduce((a, b) => Math.max(a, b), 0)
  const given = { strengths, ranges: bench.machine.sheet.ranges, scale: settings.scale ?? ('fit' as const) }
  return strengthEffects(layout, bench.ising, given, bounds, controlErrorOf(bench)).map(
    ({ factor, noise, ...effect }) => ({
      factor,
      k: held.length > 0 ? { min: least * factor, max: most * factor } : { min: 0, max: 0 },
      noise: Number.isFinite(noise) ? noise : null,
      ...effect,
    }),
  )
}

/** Programmed values over the machine's ranges, the coefficients that drown, and what other strengths would do. */
export async function precisionView(app: App, actor: Actor, id: string): Promise<PrecisionView> {
  const shown = await load(app, actor, id)
  const { bench, programmed } = shown
  const { h, J, isChainCoupler, scale } = programmed
  const { ranges } = bench.machine.sheet
  const error = controlErrorOf(bench)
  const first = drownedCoefficients(bench.ising, scale, error).slice(0, LISTED)
  const shares = sharesOf(programmed, bench.ising)
  const couplings = (inside: number) =>
    valueCounts(
      J.filter((_, c) => isChainCoupler[c] === inside),
      ranges.J,
    )
  return {
    fields: {
      range: ranges.h,
      sigma: error.sigmaH,
      counts: valueCounts(
        h.filter((field) => field !== 0),
        ranges.h,
      ),
    },
    couplings: { range: ranges.J, sigma: error.sigmaJ, counts: couplings(0), inside: couplings(1) },
    drowned: {
      ...countDrowned(bench.ising, scale, error),
      first: first.map((coefficient) => drownedView(bench, coefficient, shares)),
    },
    effects: effectsOf(shown),
  }
}

/** All coefficients that drown, as CSV: the most drowned first. */
export async function drownedFile(app: App, actor: Actor, id: string): Promise<{ fileName: string; text: string }> {
  const { number, bench, programmed } = await load(app, actor, id)
  const shares = sharesOf(programmed, bench.ising)
  const lines = drownedCoefficients(bench.ising, programmed.scale, controlErrorOf(bench)).map((coefficient) => {
    const { of, value, size, perSigma, parts } = drownedView(bench, coefficient, shares)
    return `${[coefficient.kind, csvCell(of[0]!), csvCell(of[1] ?? ''), value, size, perSigma, parts].join(',')}\n`
  })
  const head = 'kind,variable,other variable,value,scaled size,scaled size over sigma,parts\n'
  return { fileName: `RS-${number}-under-2-sigma.csv`, text: head + lines.join('') }
}
