import { chainsBelow } from '../../shared/engine/programming/strength-effects'
import { DomainError } from '../../shared/errors'
import type { DraftChange, NextDraft, NextDraftView } from '../../shared/schemas/return-analysis'
import type { RunSheetSettings } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import { withAdvice } from './apply-advice'
import type { Bench } from './programming'
import { programmeBench, requireProgrammed } from './programming'
import { analysed } from './return-analysis'
import { estimate } from './run-sheet-time'
import { insertDraft, runSheetRow } from './run-sheets'

const figure = (value: number): string => String(Number(value.toPrecision(4)))
const ruleText = ({ strength: { rule, value, perChain } }: RunSheetSettings): string => {
  const own = Object.keys(perChain ?? {}).length
  const each = own > 0 ? `, ${own} ${own === 1 ? 'chain' : 'chains'} with a value of their own` : ''
  return `${rule === 'manual' ? 'as entered' : `${rule} rule`}${value === undefined ? '' : ` ${figure(value)}`}${each}`
}
const scheduleText = ({ schedule, annealMicroseconds }: RunSheetSettings): string =>
  schedule
    ? schedule.map(({ microseconds, s }) => `s = ${figure(s)} at ${figure(microseconds)} µs`).join(', ')
    : `straight, ${figure(annealMicroseconds)} µs`

/** What the settings say and what follows from them, each under its name. */
function described(bench: Bench, settings: RunSheetSettings): Map<string, string> {
  const programming = programmeBench(bench, settings)
  const { scale } = requireProgrammed(programming)
  const { layout, strengths, bounds } = programming
  return new Map([
    ['Chain strength', ruleText(settings)],
    ['Chains under their cut bound', String(chainsBelow(layout, strengths, bounds))],
    ['Couplers of an interaction', settings.interactionCouplers],
    ['Scale', `${figure(scale)}${settings.scale === null ? ', the greatest that fits' : ', chosen'}`],
    ['Gauges', String(settings.gauges)],
    ['Reads', String(settings.reads)],
    ['Anneal schedule', scheduleText(settings)],
    ['Machine time, estimate', `${figure(estimate(bench, settings).totalMicroseconds / 1000)} ms`],
  ])
}

/** k of every chain whose strength differs. */
function strengthChanges(bench: Bench, before: RunSheetSettings, after: RunSheetSettings): DraftChange[] {
  const [from, to] = [programmeBench(bench, before).strengths, programmeBench(bench, after).strengths]
  const { offsets } = bench.embedding
  return bench.labels.flatMap((label, i) =>
    offsets[i + 1]! - offsets[i]! > 1 && from[i] !== to[i]
      ? [{ field: `k of ${label}`, from: figure(from[i]!), to: figure(to[i]!) }]
      : [],
  )
}

/** More chains than this are told of by the rule alone. */
const MOST_CHAINS = 12

function changesBetween(bench: Bench, before: RunSheetSettings, after: RunSheetSettings): DraftChange[] {
  const [from, to] = [described(bench, before), described(bench, after)]
  const settings = [...from].flatMap(([field, text]) =>
    to.get(field) === text ? [] : [{ field, from: text, to: to.get(field)! }],
  )
  const chains = strengthChanges(bench, before, after)
  return chains.length <= MOST_CHAINS ? [...settings, ...chains] : settings
}

/**
 * A draft of the run sheet that the samples came from, with chosen advice followed; or what it would change.
 * @throws DomainError for advice that the samples do not give, or that no setting follows
 */
export async function nextDraft(app: App, actor: Actor, id: string, request: NextDraft): Promise<NextDraftView> {
  const { row, bench, advice } = await analysed(app, actor, id, request)
  const chosen = request.items.map((kind) => ({ kind, item: advice.find((item) => item.kind === kind) }))
  const missing = chosen.filter(({ item }) => !item || !('set' in item.action)).map(({ kind }) => kind)
  if (missing.length > 0)
    throw new DomainError(
      'not acceptable',
      'next-draft.items',
      `These samples give no advice of the kind ${missing.join(', ')} that a setting could follow. Reload the page and choose again.`,
      [{ path: 'items', message: `not given: ${missing.join(', ')}` }],
    )
  const sheet = await runSheetRow(app, actor, row.runSheetId)
  const settings = withAdvice(
    bench,
    row.settings,
    chosen.map(({ item }) => item!.action),
  )
  const changes = changesBetween(bench, row.settings, settings)
  const madeFrom = { id: sheet.id, number: sheet.number }
  if (request.dryRun) return { id: null, number: null, madeFrom, changes }
  const draft = { bench, name: sheet.name, settings, madeFromId: sheet.id }
  const made = await app.db.transaction((tx) => insertDraft(app, tx, actor, draft))
  return { ...made, madeFrom, changes }
}
