import { expect, it } from 'vitest'
import { THIN_SPACE } from '../../../shared/engine/digits'
import { runSheetSettingsSchema } from '../../../shared/schemas/run-sheets'
import { settingChanges } from '../../../shared/settings-changes'

const settings = (given: Record<string, unknown> = {}) => runSheetSettingsSchema.parse(given)

it('tells what was changed in the settings, in the order of the sheet', () => {
  const before = settings({ reads: 500, strength: { rule: 'rms', value: 1 } })
  const after = settings({ reads: 1000, strength: { rule: 'fixed', value: 1.25 }, scale: 0.5 })
  expect(settingChanges(before, before)).toEqual([])
  expect(settingChanges(before, after)).toEqual([
    { setting: 'chain strength', before: 'rms 1', after: 'fixed 1.25' },
    { setting: 'reads', before: '500', after: `1${THIN_SPACE}000` },
    { setting: 'scale', before: 'as fits', after: '0.5' },
  ])
})

it('sees that single chains have another strength', () => {
  const of = (a: number) => settings({ strength: { rule: 'manual', value: 2, perChain: { a } } })
  expect(settingChanges(of(1), of(3))).toEqual([{ setting: 'strength of single chains', before: 'a 1', after: 'a 3' }])
  const plain = settings({ strength: { rule: 'manual', value: 2 } })
  expect(settingChanges(plain, of(3))).toEqual([
    { setting: 'strength of single chains', before: 'a as the others', after: 'a 3' },
  ])
})
