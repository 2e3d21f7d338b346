import { describe, expect, it } from 'vitest'
import { sharesOf } from '../../../../server/jobs/kinds/rehearsal'
import { rehearsalChoices, rehearsalSettings } from '../../../../server/services/rehearsal-settings'
import { rehearse } from '../../../../server/workers/tasks/rehearse'
import { programme } from '../../../../shared/engine/programming/programme'
import { joinSamples } from '../../../../shared/engine/sampling/merge'
import type { MachineSheet } from '../../../../shared/schemas/machines'
import type { Rehearse } from '../../../../shared/schemas/run-sheets'
import { rehearseSchema, runSheetSettingsSchema } from '../../../../shared/schemas/run-sheets'
import { must, randomInstance, wideRanges } from '../../engine/programming/instances'

const instance = randomInstance(8, { order: 60, sizes: [12, 9, 9, 9, 9, 9], density: 0.1, field: 1 })
const programmed = must(
  programme({
    ...instance,
    strengths: new Float64Array(6).fill(2),
    ranges: wideRanges,
    fieldSplit: 'even',
    interactionCouplers: 'all',
    chainCouplers: 'all',
  }).programmed,
)
const energyTable = { s: [0, 1], A: [6, 0], B: [0.2, 10] }
const sheet = { controlError: { h: 0.02, J: 0.015 }, temperatureMillikelvin: 15, energyTable } as MachineSheet
const run = runSheetSettingsSchema.parse({ annealMicroseconds: 20, gauges: 3, seed: 4 })
const quiet = { now: () => 0, cancelled: () => false, report: () => undefined }

const settingsOf = (input: Partial<Rehearse>, on: MachineSheet = sheet) =>
  rehearsalSettings(rehearseSchema.parse(input), programmed, on)

describe('sharesOf', () => {
  it.each([
    { model: 'simulated annealing', arithmetic: '16-bit' },
    { model: 'simulated annealing', arithmetic: '32-bit' },
    { model: 'simulated annealing', arithmetic: '64-bit' },
    { model: 'path-integral', slices: 4 },
  ] as const)('gives the same rows on any number of threads (%j)', (asked) => {
    const settings = settingsOf({ ...asked, reads: 100, sweeps: 8, controlError: true })
    const rows = [1, 2, 7].map((threads) => {
      const shares = sharesOf(programmed, settings, run, sheet, threads)
      expect(shares.reduce((sum, { reads }) => sum + reads, 0)).toBe(100)
      expect(shares.every(({ firstRead }) => firstRead % 16 === 0)).toBe(true)
      return joinSamples(shares.map((share) => rehearse(share, quiet)))
    })
    expect(rows[1]).toEqual(rows[0])
    expect(rows[2]).toEqual(rows[0])
    expect(new Set(rows[0]!.bytes).size).toBeGreaterThan(10)
  })

  it('draws error anew in each gauge, and no read twice', () => {
    const shares = sharesOf(programmed, settingsOf({ reads: 100, controlError: true }), run, sheet, 1)
    const seeds = new Map(shares.map(({ gauge, error }) => [gauge!.number, error!.seed]))
    expect(new Set(seeds.values()).size).toBe(3)
    const reads = shares.flatMap(({ firstRead, reads: count }) =>
      Array.from({ length: count }, (_, k) => firstRead + k),
    )
    expect(new Set(reads).size).toBe(100)
  })
})

describe('rehearsalSettings', () => {
  it('take 16 bits by themselves only where control error hides their rounding', () => {
    const { bits16, bits32 } = rehearsalChoices(programmed, sheet)
    expect(settingsOf({ controlError: true })).toMatchObject({ arithmetic: '16-bit', rounding: bits16 })
    expect(settingsOf({ controlError: false })).toMatchObject({ arithmetic: '32-bit', rounding: bits32 })
    expect(settingsOf({ controlError: true, temperature: 0.001 }).arithmetic).toBe('32-bit')
    expect(settingsOf({ arithmetic: '64-bit' })).toMatchObject({ arithmetic: '64-bit', rounding: 0, slices: null })
  })

  it('take the machine’s temperature for a path integral, and the run sheet’s schedule', () => {
    const path = settingsOf({ model: 'path-integral' })
    expect(path.temperature).toBeCloseTo((0.015 * 20.83661912) / 5, 8)
    const method = (schedule: typeof run.schedule) =>
      sharesOf(programmed, path, { ...run, schedule }, sheet, 1)[0]!.method
    expect(method(null)).toMatchObject({ slices: 32, schedule: { t: [0, 20], s: [0, 1] } })
    const paused = [0, 0.4, 0.4, 1].map((s, k) => ({ microseconds: 5 * k, s }))
    expect(method(paused)).toMatchObject({ schedule: { t: [0, 5, 10, 15], s: [0, 0.4, 0.4, 1] } })
  })

  it('refuse a path integral without temperature or energy table', () => {
    for (const lacking of [{ temperatureMillikelvin: null }, { energyTable: null }])
      expect(() => settingsOf({ model: 'path-integral' }, { ...sheet, ...lacking })).toThrow(/energy table/)
  })
})
