import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { weightOf } from './item'

/** Standard errors of the mean that a fall must exceed to be seen at all. */
const SEEN = 2

/** A greater scale, where one was chosen below what fits and the samples look warm enough to gain by it. */
export function scaleAdvice({ scale, temperature }: Evidence): AdviceItem[] {
  if (!scale.isChosen || !temperature || scale.greatest <= scale.value) return []
  const { fallAtGreatest, standardError, value, interval } = temperature
  if (fallAtGreatest <= SEEN * standardError) return []
  return [
    {
      kind: 'scale',
      weight: weightOf('scale', 1 - scale.value / scale.greatest),
      action: { set: 'scale', to: 'fit' },
      sentence:
        'Use the greatest scale that fits the ranges. At the temperature that the samples look to have, the problem is then colder, and the mean energy falls by more than its standard error.',
      evidence: [
        { name: 'effective temperature, in programmed units', value, ...(interval ?? {}), unit: 'number' },
        { name: 'fall of the mean energy, to first order', value: fallAtGreatest, unit: 'energy' },
        { name: 'standard error of the mean energy', value: standardError, unit: 'energy' },
        { name: 'scale', value: scale.value, unit: 'number' },
        { name: 'greatest scale', value: scale.greatest, unit: 'number' },
      ],
    },
  ]
}
