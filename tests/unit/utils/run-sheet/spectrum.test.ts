import { expect, it } from 'vitest'
import type { Spectrum } from '../../../../shared/engine/spectrum/spectrum'
import { levelSeries, pauseAt, pauseReason, spectrumRules, spectrumText } from '../../../../utils/run-sheet/spectrum'

const spectrum: Spectrum = {
  s: Float64Array.from([0, 0.5, 1]),
  levels: [
    Float64Array.from([-4, -3, -5]),
    Float64Array.from([-2, -2.9, -5]),
    Float64Array.from([-1, -2.5, -3]),
    Float64Array.from([0, -2, -3]),
  ],
  groundStates: 2,
  gap: { s: 0.45, gigahertz: 0.2, course: Float64Array.from([3, 0.5, 2]) },
  residual: 1e-6,
}

it('shows levels above the lowest, and which of them counts', () => {
  const series = levelSeries(spectrum)
  expect(series.map(({ name }) => name)).toEqual(['level 1, ends in a ground state', 'level 2', 'level 3'])
  expect(series[1]!.points.map(({ y }) => y)).toEqual([3, 0.5, 2])
  expect(series.map(({ tone }) => tone)).toEqual(['slate', 'leaf', 'ink2'])
  expect(series[1]!.stroke).toBe('solid')
})

it('says how the least gap stands to kT, and where a pause may serve', () => {
  // 20 mK are 0.417 GHz, 5 mK 0.104 GHz.
  expect(spectrumText(spectrum, 20)).toContain('under kT, 0.417 GHz')
  expect(spectrumText(spectrum, 5)).toContain('over kT, 0.104 GHz')
  expect(spectrumText(spectrum, null)).toBe('The least gap is 0.2 GHz, at s = 0.45. 2 ground states at the end.')
  expect(spectrumText({ ...spectrum, gap: null }, 20)).toContain('too many')
  expect(pauseAt(spectrum, 20)).toBe(0.5)
  expect(pauseReason(spectrum, 20)).toContain('past the least gap')
  expect(pauseReason(spectrum, 5)).toContain('at the least gap')
  expect(pauseAt(spectrum, 5)).toBe(0.45)
  expect(pauseAt(spectrum, null)).toBeNull()
  expect(spectrumRules(spectrum, 20).map(({ axis }) => axis)).toEqual(['x', 'y'])
  expect(spectrumRules({ ...spectrum, gap: null }, null)).toEqual([])
})
