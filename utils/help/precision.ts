import type { SmallestView } from '#shared/schemas/run-sheets'
import { CAUTIONS } from './cautions'
import { entry } from './entry'
import { over, size, times } from './formula'
import { KING_MCGEOCH, MACHINE_SHEET, OWN } from './sources'
import { formatNumber, formatPercent, formatSignificant } from '../format'

/** How the coefficients of a problem are held against a machine's control error. */

interface UnderGiven {
  under: number
  of: number
  sigmaH: number
  sigmaJ: number
}

/** Nought where the machine states none for a kind: its coefficients are left out. */
const ofKind = (name: string, sigma: number): string => (sigma > 0 ? `${name} under ${formatNumber(2 * sigma)}` : '')

export const precisionHelp = {
  coefficientOverSigma: entry<SmallestView & { scale: number; smallest: boolean }>({
    inputs: ({ kind, value, sigma, scale }) => [
      { symbol: 'α', name: 'scale', value: scale },
      { symbol: 'c', name: `${kind === 'field' ? 'h' : 'J'} of the Ising form`, value },
      { symbol: 'σ', name: `control error of ${kind === 'field' ? 'h' : 'J'}`, value: sigma, from: 'machine sheet' },
    ],
    steps: () => [
      {
        symbol: 'q',
        name: 'scaled size over σ',
        expr: over(times('α', size('c')), 'σ'),
        show: (value) => formatSignificant(value),
      },
    ],
    method: ({ smallest }) =>
      `${smallest ? 'The smallest such ratio over all coefficients that are not zero. ' : ''}The whole coefficient is compared, before it is shared over qubits or couplers. Shared over m of them, each part is an m-th of it, while the errors of the parts together grow only as √m.`,
    sources: () => [KING_MCGEOCH, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  coefficientsUnder: entry<UnderGiven>({
    inputs: ({ under, of, sigmaH, sigmaJ }) => [
      {
        symbol: 'u',
        name: `coefficients with a scaled size under 2σ: ${[ofKind('h', sigmaH), ofKind('J', sigmaJ)].filter(Boolean).join(', ')}`,
        value: under,
      },
      { symbol: 'N', name: 'coefficients of the Ising form that are not zero', value: of },
    ],
    steps: () => [
      {
        symbol: 'p',
        name: 'share under 2σ',
        expr: over('u', 'N'),
        show: (value) => formatPercent(value, { significant: 2 }),
      },
    ],
    method: () =>
      'Control error is taken as Gaussian. A coefficient whose size times α is smaller than two standard deviations drowns in it.',
    sources: () => [KING_MCGEOCH, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
  scaleAtFactor: entry<{ factor: number; text: string }>({
    inputs: ({ factor }) => [{ symbol: 'f', name: 'factor on the strength of every chain', value: factor }],
    method: () =>
      'The run sheet is programmed anew with every k times f: fields, couplings and ranges are the same, and α is again the largest factor, at most 1, that fits, or the one chosen below.',
    result: ({ text }) => text,
    sources: () => [OWN, MACHINE_SHEET],
    caution: () => CAUTIONS.sheet,
  }),
}
