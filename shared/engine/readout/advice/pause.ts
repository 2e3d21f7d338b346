import type { Evidence } from './evidence'
import type { AdviceItem } from './item'
import { weightOf } from './item'

/** Pause where the spectrum says that a pause may serve (docs/formulas.md, Anneal schedule and spectrum). */
export function pauseAdvice({ pause }: Evidence): AdviceItem[] {
  if (!pause) return []
  const { s, gap, gapAt, kT } = pause
  return [
    {
      kind: 'pause',
      weight: weightOf('pause', 0.5),
      action: { set: 'pause', s },
      sentence: `Try a pause at s = ${Number(s.toPrecision(3))}, ${gap < kT ? 'past the least gap, where it has opened to kT again' : 'at the least gap, which kT does not reach'}. Worked out from the problem without its chains; whether it helps is for samples to say.`,
      evidence: [
        { name: `least gap, at s = ${Number(gapAt.toPrecision(3))}`, value: gap, unit: 'GHz' },
        { name: 'kT', value: kT, unit: 'GHz' },
      ],
    },
  ]
}
