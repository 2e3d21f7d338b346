import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { weightOf } from './item'

/** A blur that falls by less than this share is not worth a change of the settings. Ours. */
const LEAST_GAIN = 0.05

/** Coefficients that control error may drown: one coupler an interaction where that helps, else a look at them. */
export function precisionAdvice({ precision }: Evidence): AdviceItem[] {
  const { isKnown, coefficients, underTwoSigma, blur, blurWithOneCoupler, smallest } = precision
  if (!isKnown || underTwoSigma === 0) return []
  const isHelped = blurWithOneCoupler !== null && blurWithOneCoupler < (1 - LEAST_GAIN) * blur
  return [
    {
      kind: 'precision',
      weight: weightOf('precision', underTwoSigma / coefficients),
      action: isHelped ? { set: 'interaction couplers', to: 'one' } : { look: 'coefficients' },
      sentence: isHelped
        ? 'Put each interaction on one coupler. Some coefficients are under twice the control error, and every further coupler adds an error of its own.'
        : 'Look at the smallest coefficients. Some are under twice the control error when programmed: what the samples say of them is noise. Pre-solve, or a problem with less range between its coefficients, leaves more room.',
      evidence: [
        { name: `coefficients under 2σ, of ${coefficients}`, value: underTwoSigma, unit: 'count' },
        { name: 'smallest coefficient', value: smallest, unit: 'energy' },
        { name: 'blur of energies by control error, one σ', value: blur, unit: 'energy' },
        ...(isHelped
          ? [{ name: 'the same with one coupler an interaction', value: blurWithOneCoupler, unit: 'energy' as const }]
          : []),
      ],
    },
  ]
}
