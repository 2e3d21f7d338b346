import type { RunSheetSettings } from './schemas/run-sheets'

/** A setting that was changed, before and after, as it reads. */
export interface SettingChange {
  setting: string
  before: string
  after: string
}

const strengthText = ({ strength }: RunSheetSettings): string => {
  const { rule, ...rest } = strength
  const value = 'value' in rest ? ` ${String(rest.value)}` : ''
  return `${rule}${value}`
}

const scheduleText = ({ schedule }: RunSheetSettings): string =>
  schedule ? schedule.map(({ microseconds, s }) => `s ${s} at ${microseconds} µs`).join(', ') : 'straight ramp'

const READINGS: readonly (readonly [setting: string, of: (settings: RunSheetSettings) => string])[] = [
  ['chain strength', strengthText],
  ['share of h over a chain', ({ fieldSplit }) => fieldSplit],
  ['share of J over couplers', ({ interactionCouplers }) => interactionCouplers],
  ['couplers inside a chain', ({ chainCouplers }) => chainCouplers],
  ['gauges', ({ gauges }) => String(gauges)],
  ['reads', ({ reads }) => String(reads)],
  ['anneal time', ({ annealMicroseconds }) => `${annealMicroseconds} µs`],
  ['schedule', scheduleText],
  ['scale', ({ scale }) => (scale === null ? 'as fits' : String(scale))],
  ['seed', ({ seed }) => String(seed)],
]

/** What was changed from one state of a run sheet's settings to another, in the order of the sheet. */
export function settingChanges(before: RunSheetSettings, after: RunSheetSettings): SettingChange[] {
  const changes = READINGS.map(([setting, of]) => ({ setting, before: of(before), after: of(after) }))
  const changed = changes.filter((change) => change.before !== change.after)
  // A strength may differ in single chains only.
  const isHidden = JSON.stringify(before.strength) !== JSON.stringify(after.strength)
  const isShown = changed.some(({ setting }) => setting === 'chain strength')
  return isHidden && !isShown
    ? [{ setting: 'chain strength', before: 'other single chains', after: 'single chains changed' }, ...changed]
    : changed
}
