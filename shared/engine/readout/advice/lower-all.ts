import { STRENGTH_DEFAULTS } from '../../programming/strength'
import { wilson } from '../intervals'
import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { breaksOf, shareFigure, weightOf } from './item'

/** So few breaks that a weaker k has room: one chain in two hundred, with the whole interval under it. Ours. */
const FEW_BROKEN = 0.005
/** Least and greatest step down, for breaks begin suddenly. */
const STEP = { furthest: 0.5, usual: 0.8 }

/** Lower k of all chains where none breaks and it is k that keeps the problem's coefficients small. */
export function lowerAll({ chains, reads, scale, precision }: Evidence): AdviceItem[] {
  if (chains.length === 0 || !scale.isLimitedByChains || !precision.isKnown) return []
  const isCramped = precision.underTwoSigma > 0 || precision.blur > precision.smallest
  const chainReads = chains.length * reads
  if (!isCramped || wilson(breaksOf(chains), chainReads).high >= FEW_BROKEN) return []
  const bound = chains.reduce((most, { strength, bound }) => Math.max(most, bound / strength), 0)
  const factor = Math.min(STEP.usual, Math.max(STEP.furthest, STRENGTH_DEFAULTS.margin * bound))
  return [
    {
      kind: 'lower-all',
      weight: weightOf('lower-all', precision.underTwoSigma / Math.max(1, precision.coefficients)),
      action: { set: 'strength of all', factor },
      sentence: `Lower k of all chains by ${Math.round(100 * (1 - factor))} %. Hardly any chain breaks, and it is k that keeps the scale down, so that control error blurs the problem.`,
      evidence: [
        shareFigure('chain reads that broke', breaksOf(chains), chainReads),
        { name: `coefficients under 2σ, of ${precision.coefficients}`, value: precision.underTwoSigma, unit: 'count' },
        { name: 'blur of energies by control error, one σ', value: precision.blur, unit: 'energy' },
        { name: 'smallest coefficient', value: precision.smallest, unit: 'energy' },
        { name: 'scale', value: scale.value, unit: 'number' },
      ],
    },
  ]
}
