import { groupDigits } from './engine/digits'
import { scheduleText } from './run-sheet-comparison'
import type { RunSheetSettings } from './schemas/run-sheets'

/** A setting that was changed, before and after, as it reads. */
export interface SettingChange {
  setting: string
  before: string
  after: string
}

/** Chains that are named; of more the count is told. */
const MOST_NAMED = 4

const strengthText = ({ strength: { rule, value } }: RunSheetSettings): string =>
  value === undefined ? rule : `${rule} ${value}`

/** Strengths of single chains that differ, as they were or are. */
function singleChains(before: RunSheetSettings, after: RunSheetSettings): SettingChange[] {
  const [old, now] = [before.strength.perChain ?? {}, after.strength.perChain ?? {}]
  const labels = Object.keys({ ...old, ...now }).filter((label) => old[label] !== now[label])
  if (labels.length === 0) return []
  const more = labels.length > MOST_NAMED ? ` and ${labels.length - MOST_NAMED} more` : ''
  const text = (of: Record<string, number>) =>
    labels
      .slice(0, MOST_NAMED)
      .map((label) => `${label} ${of[label] ?? 'as the others'}`)
      .join(', ') + more
  return [{ setting: 'strength of single chains', before: text(old), after: text(now) }]
}

const READINGS: readonly (readonly [setting: string, of: (settings: RunSheetSettings) => string])[] = [
  ['chain strength', strengthText],
  ['share of h over a chain', ({ fieldSplit }) => fieldSplit],
  ['share of J over couplers', ({ interactionCouplers }) => interactionCouplers],
  ['couplers inside a chain', ({ chainCouplers }) => chainCouplers],
  ['gauges', ({ gauges }) => groupDigits(gauges)],
  ['reads', ({ reads }) => groupDigits(reads)],
  ['anneal time', ({ annealMicroseconds }) => `${annealMicroseconds} µs`],
  ['schedule', scheduleText],
  ['scale', ({ scale }) => (scale === null ? 'as fits' : String(scale))],
  ['seed', ({ seed }) => String(seed)],
]

/** What was changed from one state of a run sheet’s settings to another, in the order of the sheet. */
export const settingChanges = (before: RunSheetSettings, after: RunSheetSettings): SettingChange[] => [
  ...READINGS.map(([setting, of]) => ({ setting, before: of(before), after: of(after) })).filter(
    (change) => change.before !== change.after,
  ),
  ...singleChains(before, after),
]
