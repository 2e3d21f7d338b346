import type { ChainRow, CheckView, RunSheetView } from '#shared/schemas/run-sheets'
import type { Fact } from '../ui/parts'
import { formatNumber } from '../format'
import { splitDuration } from '../formatTime'
import { chainStrengthHelp, timeHelp } from './help'
import { strengthText } from './strength'

/** `4 passed, 2 cautions, none refused`. */
export function checksText(checks: readonly CheckView[]): string {
  const [passed, cautions, refused] = (['passed', 'caution', 'refused'] as const).map(
    (verdict) => checks.filter((check) => check.verdict === verdict).length,
  ) as [number, number, number]
  const words = [`${passed} passed`]
  if (cautions > 0) words.push(`${cautions} ${cautions === 1 ? 'caution' : 'cautions'}`)
  words.push(refused > 0 ? `${refused} refused` : 'none refused')
  return words.join(', ')
}

/** The strip under the title of a run sheet; `chains` as far as they are loaded. */
export function runSheetFacts(sheet: RunSheetView, chains: readonly ChainRow[]): Fact[] {
  const { settings, checks } = sheet
  const chosen = sheet.rules.find(({ selected }) => selected)
  const time = splitDuration(sheet.machineTime.totalMilliseconds / 1000)
  const gauges = settings.gauges === 1 ? 'in one gauge' : `in ${formatNumber(settings.gauges)} gauges`
  const passed = checks.filter(({ verdict }) => verdict === 'passed').length
  return [
    { label: 'State', value: sheet.state, mark: sheet.state },
    { label: 'Machine', value: sheet.machine.name, note: `calibration ${sheet.calibration}` },
    { label: 'Chain strength', value: chosen ? strengthText(chosen.k) : '–', ...chainStrengthHelp(sheet, chains) },
    { label: 'Reads', value: formatNumber(settings.reads), note: gauges },
    { label: 'Anneal', value: formatNumber(settings.annealMicroseconds), unit: 'µs' },
    { label: 'Machine time', value: time.value, unit: `${time.unit}, estimate`, ...timeHelp(sheet) },
    { label: 'Checks', value: passed, note: checksText(checks).replace(/^\d+ /, '') },
  ]
}
