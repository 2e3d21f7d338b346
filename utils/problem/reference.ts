import type { JobView } from '#shared/schemas/jobs'
import type { OptimumMethodName, ReferenceItem, ReferencePart, ReferenceProgress } from '#shared/schemas/reference'
import type { Fact } from '../ui/parts'
import { formatCount, formatNumber } from '../format'
import { formatDuration } from '../formatTime'

/** Choices of the form; `auto`, which is no method, leaves it to each component. */
export const METHOD_CHOICES = [
  { value: 'auto', label: 'as suits each component' },
  { value: 'enumeration', label: 'enumeration, up to 32 variables' },
  { value: 'tree decomposition', label: 'tree decomposition, width up to 24' },
  { value: 'integer programme', label: 'integer programme' },
  { value: 'annealing', label: 'annealing, proves nothing' },
] as const

/** The look that is under way, if there is one. */
export const runningLook = (looks: readonly ReferenceItem[]): ReferenceItem | undefined =>
  looks.find(({ status }) => status === 'running')

const RANK: Partial<Record<ReferenceItem['status'], number>> = { proved: 0, 'best found': 1 }

/** The look that counts: a proved one first, then the best energy, then the newest. */
export function bestLook(looks: readonly ReferenceItem[], sense: 'min' | 'max'): ReferenceItem | undefined {
  const sign = sense === 'min' ? 1 : -1
  return looks
    .filter(({ status, energy }) => status in RANK && energy !== null)
    .sort((a, b) => RANK[a.status]! - RANK[b.status]! || sign * (a.energy! - b.energy!))[0]
}

/** Of the newest look when it came to nothing; null when it did not. */
export function failedWords(looks: readonly ReferenceItem[]): string | null {
  const newest = looks[0]
  if (newest?.status === 'failed') return `The last look failed: ${newest.reason ?? 'no reason is known'}.`
  if (newest?.status === 'cancelled') return 'The last look was cancelled before it had any state.'
  return null
}

/** Methods that went into a value, each once. */
export function methodsOf({ parts }: Pick<ReferenceItem, 'parts'>): OptimumMethodName[] {
  return [...new Set(parts.map(({ method, by, proved }) => (proved ? method : by)))]
}

/** The strip of a value that was found. */
export function referenceFacts(look: ReferenceItem, sense: 'min' | 'max'): Fact[] {
  const { energy, bound, gap, tolerance, optima, seconds, status } = look
  const proved = status === 'proved'
  const methods = methodsOf(look)
  const facts: Fact[] = [
    {
      label: sense === 'min' ? 'Lowest energy' : 'Highest value',
      value: formatNumber(energy),
      help: { id: 'referenceValue', given: { energy: energy!, proved, tolerance, methods } },
      name: 'the reference optimum',
    },
    {
      label: 'Outcome',
      value: proved ? 'proved' : 'best found',
      mark: proved ? 'passed' : 'caution',
      note: proved && tolerance > 0 ? `within ${formatNumber(tolerance, { significant: 2 })}` : undefined,
    },
  ]
  if (!proved && bound !== null && gap !== null)
    facts.push(
      {
        label: sense === 'min' ? 'Not below' : 'Not above',
        value: formatNumber(bound),
        help: { id: 'referenceBound', given: { bound, sense, methods } },
        name: 'the proved bound',
      },
      {
        label: 'Gap',
        value: formatNumber(gap),
        help: { id: 'referenceGap', given: { energy: energy!, bound } },
        name: 'the gap to the bound',
      },
    )
  if (optima !== null) facts.push({ label: 'States that have it', value: formatNumber(optima) })
  facts.push({ label: 'Took', value: formatDuration(seconds) })
  return facts
}

/** "12 components, 40 variables at most". */
export const sizeWords = ({ components, variables, interactions }: ReferencePart): string =>
  components === 1
    ? `${formatCount(variables, 'variable')}, ${formatCount(interactions, 'interaction')}`
    : `${formatCount(components, 'component')} of at most ${formatCount(variables, 'variable')}`

export const methodCell = ({ method, width, proved, by }: ReferencePart): string => {
  const name = width === null ? method : `${method}, width ${formatNumber(width)}`
  return proved || by === method ? name : `${name}; state by ${by}`
}

/** Figures of a running look; null before its first report. */
export function progressOf(job: JobView | null): ReferenceProgress | null {
  const detail = job?.detail as Partial<ReferenceProgress> | undefined
  return detail?.doing === undefined ? null : (detail as ReferenceProgress)
}

/** "Best −201, not below −243. Integer programme of 40 variables." */
export function standingWords({ best, bound, doing, components, solved }: ReferenceProgress, sense: 'min' | 'max') {
  const edge = `not ${sense === 'min' ? 'below' : 'above'} ${formatNumber(bound)}`
  const figures = best === null ? `No state yet, ${edge}.` : `Best ${formatNumber(best)}, ${edge}.`
  const work = `${doing.charAt(0).toUpperCase()}${doing.slice(1)}`
  const done = components > 1 ? `; ${formatNumber(solved)} of ${formatCount(components, 'component')} done` : ''
  return `${figures} ${work}${done}.`
}
