import type { Evidence, GroupEvidence } from './evidence'
import type { AdviceFigure, AdviceItem } from './item'
import { namesOf, shareFigure, weightOf } from './item'

/** P over what is enough, and penalties over the rest of the coefficients, from which they are called too strong. Ours. */
const TOO_STRONG = { overSufficient: 3, overRest: 3 }
const MOST_SHOWN = 3

const weightFigures = ({ name, weight, sufficient }: GroupEvidence): AdviceFigure[] =>
  weight === null || sufficient === null
    ? []
    : [
        { name: `P of ${name}`, value: weight, unit: 'energy' },
        { name: `P that is enough for ${name}`, value: sufficient, unit: 'energy' },
      ]

/** Penalties that the best answer gains by breaking. One that is proved strong enough is not to blame. */
export function weakPenalties({ groups, readsDecoded }: Evidence): AdviceItem[] {
  const weak = groups.filter(
    ({ isBrokenInBest, weight, sufficient }) =>
      isBrokenInBest && !(weight !== null && sufficient !== null && weight > sufficient),
  )
  if (weak.length === 0) return []
  return [
    {
      kind: 'weak-penalties',
      weight: weightOf('weak-penalties', weak.length / groups.length),
      action: { look: 'groups', groups: weak.map(({ name }) => name) },
      sentence: `Raise the ${weak.length === 1 ? 'penalty' : 'penalties'} of ${namesOf(weak.map(({ name }) => name))} in the problem. The best answer found breaks ${weak.length === 1 ? 'it' : 'them'}: breaking seems to pay.`,
      evidence: weak
        .slice(0, MOST_SHOWN)
        .flatMap((group) => [
          shareFigure(`reads that break ${group.name}`, group.violations, readsDecoded),
          ...weightFigures(group),
        ]),
    },
  ]
}

/** Penalties far above what is enough that take the range from the rest, while no read breaks a group. */
export function strongPenalties({ groups, largest, readsDecoded, precision }: Evidence): AdviceItem[] {
  const { withinGroups, elsewhere } = largest
  const isDominating = elsewhere > 0 && withinGroups > TOO_STRONG.overRest * elsewhere
  if (!isDominating || !precision.isKnown || groups.some(({ violations }) => violations > 0)) return []
  const strong = groups.filter(
    ({ weight, sufficient }) =>
      weight !== null && sufficient !== null && weight > TOO_STRONG.overSufficient * sufficient,
  )
  if (strong.length === 0) return []
  return [
    {
      kind: 'strong-penalties',
      weight: weightOf('strong-penalties', 1 - elsewhere / withinGroups),
      action: { look: 'groups', groups: strong.map(({ name }) => name) },
      sentence: `Lower the ${strong.length === 1 ? 'penalty' : 'penalties'} of ${namesOf(strong.map(({ name }) => name))} in the problem. No read breaks a group, and the penalties take the range that the objective needs.`,
      evidence: [
        shareFigure('reads that break a group', 0, readsDecoded),
        { name: 'largest coefficient within a group', value: withinGroups, unit: 'energy' },
        { name: 'largest coefficient elsewhere', value: elsewhere, unit: 'energy' },
        ...strong.slice(0, MOST_SHOWN).flatMap(weightFigures),
      ],
    },
  ]
}
