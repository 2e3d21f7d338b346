import { GIGAHERTZ_PER_KELVIN } from '#shared/engine/machine/energy-units'
import type { Arithmetic } from '#shared/engine/sampling/arithmetic'
import { CAUTIONS } from './cautions'
import { entry } from './entry'
import { over, times } from './formula'
import { CODATA, ISAKOV, MACHINE_SHEET, MARTONAK, OWN } from './sources'
import { formatNumber, formatSignificant } from '../format'

/** How the numbers of a rehearsal’s settings are computed. */

interface RoundingGiven {
  arithmetic: Arithmetic
  /** Largest |h| + Σ|J| at a qubit, in programmed units. */
  largestField: number
  /** The smaller of σ_h and σ_J where control error is drawn. */
  sigma: number | null
}

/** Steps that the largest local field is worth, by arithmetic. */
export const STEPS: Readonly<Record<Exclude<Arithmetic, '64-bit'>, number>> = { '16-bit': 32_000, '32-bit': 2 ** 23 }

const WHY =
  'Sixteen reads are annealed at once in whole steps of the largest local field; every field and coupling is rounded to the nearest one. Chosen by itself, 16-bit arithmetic is used where control error is drawn and the rounding is at most a tenth of the smaller σ and a hundredth of the final temperature; otherwise 32-bit.'

export const rehearsalHelp = {
  rounding: entry<RoundingGiven>({
    inputs: ({ arithmetic, largestField, sigma }) =>
      arithmetic === '64-bit'
        ? []
        : [
            { symbol: 'F', name: 'largest |h| + Σ|J| at a qubit, in programmed units', value: largestField },
            { symbol: 'N', name: `steps that it is worth in ${arithmetic} arithmetic`, value: STEPS[arithmetic] },
            ...(sigma === null ? [] : [{ symbol: 'σ', name: 'smaller of σ of h and σ of J, drawn', value: sigma }]),
          ],
    steps: ({ arithmetic }) =>
      arithmetic === '64-bit'
        ? []
        : [
            {
              symbol: 'q',
              name: 'rounding: the most that a programmed value is off',
              expr: over('F', times(2, 'N')),
              show: (value) => formatSignificant(value, 2),
            },
          ],
    result: ({ arithmetic, largestField }) =>
      arithmetic === '64-bit' ? '0' : formatSignificant(largestField / (2 * STEPS[arithmetic]), 2),
    method: ({ arithmetic }) =>
      arithmetic === '64-bit'
        ? 'The plain loop in double precision holds every programmed value as it is; it is the reference for the others and the slowest.'
        : WHY,
    sources: () => [ISAKOV, OWN],
    caution: () => CAUTIONS.rehearsal,
  }),
  physicalTemperature: entry<{ millikelvin: number; B: number }>({
    inputs: ({ millikelvin, B }) => [
      { symbol: 'T', name: 'temperature', value: millikelvin, unit: 'mK', from: 'machine sheet' },
      {
        symbol: 'c',
        name: 'Boltzmann’s constant over Planck’s, k/h',
        value: GIGAHERTZ_PER_KELVIN,
        text: '20.8366',
        unit: 'GHz/K',
      },
      { symbol: 'B', name: 'B at s = 1', value: B, unit: 'GHz', from: 'machine sheet' },
    ],
    steps: () => [
      {
        symbol: 'T_1',
        name: 'temperature in programmed units',
        expr: over(times('c', over('T', 1000)), over('B', 2)),
        show: (value) => formatSignificant(value, 3),
      },
    ],
    method: () =>
      'At s = 1 the energy of a state is B/2 times its programmed energy, so a programmed energy of 1 is worth B/2. Freeze-out comes earlier in the anneal, where B is smaller: samples of a machine look hotter than this.',
    sources: () => [CODATA, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  slices: entry<{ slices: number }>({
    inputs: () => [],
    method: () =>
      'As entered. A quantum state at temperature T is stood in for by so many coupled copies of the classical one; the error of doing so falls as one over their number squared, and the work grows with it.',
    result: ({ slices }) => formatNumber(slices),
    sources: () => [MARTONAK],
    caution: () => CAUTIONS.rehearsal,
  }),
}
