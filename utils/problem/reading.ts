import { PROBLEM_FORMATS } from '#shared/problem-formats'
import type { ProblemView, ReadingView, StructureView, UploadedProblem } from '#shared/schemas/problems'
import type { Fact } from '../ui/parts'
import { formatNumber, formatPercent, formatSignificant } from '../format'

export const FORM_NAMES = { qubo: 'QUBO', ising: 'Ising' } as const

const HOW_KNOWN: Record<ReadingView['formSource'], string> = {
  given: 'as chosen',
  file: 'as the file says',
  default: 'assumed',
}
const TRIANGLES: Record<string, string> = {
  upper: 'upper',
  lower: 'lower',
  both: 'both, summed',
  symmetric: 'both, symmetric',
  'diagonal only': 'diagonal only',
}
const ENERGIES = { plus: 'E = Σ h s + Σ J s s', minus: 'E = −Σ h s − Σ J s s' } as const

/** How sure the detection is, and what else it could be. */
export function guessWords({ formatSource, likenesses = [] }: ReadingView): string {
  if (formatSource === 'given') return 'As chosen here.'
  const [best, ...others] = likenesses.map(
    ({ format, score }) => `${PROBLEM_FORMATS[format].name} (${formatPercent(score, { decimals: 0 })} alike)`,
  )
  if (!best) return 'It looks like no format; taken for a coefficient list.'
  return others.length > 0 ? `A guess: ${best}, else ${others[0]}.` : `A guess: ${best}.`
}

/** How the format was found, in a word. */
function formatNote({ formatSource, likenesses = [], container }: ReadingView): string | undefined {
  const packed = container === 'gzip' ? 'in gzip' : ''
  const found =
    formatSource === 'given' ? 'as chosen' : formatSource === 'detected' ? sureness(likenesses[0]?.score ?? 0) : ''
  return [found, packed].filter(Boolean).join(', ') || undefined
}

const SURE = 0.9
const LIKELY = 0.6

const sureness = (score: number): string =>
  score >= SURE ? 'a sure guess' : score >= LIKELY ? 'a likely guess' : 'a guess'

export const senseWord = (sense: 'min' | 'max'): string => (sense === 'min' ? 'minimise' : 'maximise')

/** What the reader took the file for. */
export function readingFacts({ reading, variables, interactions, offset }: UploadedProblem): Fact[] {
  const energy = reading.form === 'ising' ? ENERGIES[reading.convention] : undefined
  return [
    { label: 'Format', value: reading.formatTitle, word: true, note: formatNote(reading) },
    { label: 'Form', value: FORM_NAMES[reading.form], word: true, note: HOW_KNOWN[reading.formSource] },
    { label: 'Triangle', value: TRIANGLES[reading.triangle] ?? reading.triangle, word: true },
    { label: 'Convention', value: reading.convention, word: true, note: energy },
    { label: 'Sense', value: senseWord(reading.sense), word: true },
    { label: 'Variables', value: formatNumber(variables) },
    { label: 'Interactions', value: formatNumber(interactions) },
    { label: 'Offset', value: formatNumber(offset) },
  ]
}

/** What the lines came to. */
export function countingFacts(reading: ReadingView): Fact[] {
  return [
    { label: 'Entries read', value: formatNumber(reading.entriesRead) },
    { label: 'Duplicates summed', value: formatNumber(reading.duplicatesSummed) },
    { label: 'Zeros dropped', value: formatNumber(reading.zerosDropped) },
    { label: 'Lines rejected', value: formatNumber(reading.rejectedCount) },
  ]
}

/** The degrees of a problem, for a strip that is about embedding it. */
export function degreeFacts({ degree, degreeHistogram: degrees, variables, interactions }: StructureView): Fact[] {
  const format = { decimals: 2 }
  return [
    {
      label: 'Highest degree',
      value: formatNumber(degree.max),
      help: { id: 'degrees', given: { variables, interactions, degrees } },
    },
    {
      label: 'Mean degree',
      value: formatNumber(degree.mean, format),
      help: { id: 'meanDegree', given: { variables, interactions, format } },
    },
  ]
}

/** What the problem looks like as a graph. */
export function structureFacts(structure: StructureView): Fact[] {
  const { degree, degreeHistogram: degrees, dynamicRange, treewidthUpperBound, variables, interactions } = structure
  const size = { variables, interactions }
  return [
    {
      label: 'Density',
      value: formatPercent(structure.density),
      // There is no pair among fewer than two.
      help: variables > 1 ? { id: 'density', given: size } : undefined,
    },
    {
      label: 'Highest degree',
      value: formatNumber(degree.max),
      note: `mean ${formatSignificant(degree.mean)}`,
      help: { id: 'degrees', given: { ...size, degrees } },
    },
    {
      label: 'Dynamic range',
      value: formatSignificant(dynamicRange, 4),
      help:
        dynamicRange === null
          ? undefined
          : { id: 'dynamicRange', given: { value: dynamicRange, sizes: structure.coefficientSizes } },
    },
    {
      label: 'Components',
      value: formatNumber(structure.components),
      help: { id: 'components', given: { ...size, components: structure.components } },
      name: 'the number of components',
    },
    {
      label: 'Isolated',
      value: formatNumber(structure.isolated),
      help: { id: 'isolated', given: { degrees, isolated: structure.isolated } },
      name: 'the number of isolated variables',
    },
    {
      label: 'Treewidth',
      value: treewidthUpperBound === null ? 'not sought' : `≤ ${formatNumber(treewidthUpperBound)}`,
      word: treewidthUpperBound === null,
      help:
        treewidthUpperBound === null
          ? undefined
          : { id: 'problemTreewidth', given: { ...size, bound: treewidthUpperBound } },
    },
  ]
}

const plural = (count: number, one: string, many = `${one}s`): string =>
  `${formatNumber(count)} ${count === 1 ? one : many}`

const SHAPES: Record<string, string> = {
  upper: 'upper triangle',
  lower: 'lower triangle',
  both: 'both triangles summed',
}

/** One sentence about what was read: "coefficient list, upper triangle, QUBO. 3 duplicate entries summed." */
export function readingSentence(reading: ReadingView): string {
  const { formatTitle, triangle, form, duplicatesSummed, zerosDropped, entriesRead } = reading
  const shape = SHAPES[triangle] ?? triangle
  return [
    `${formatTitle}, ${shape}, ${FORM_NAMES[form]}.`,
    `${plural(entriesRead, 'entry', 'entries')} read.`,
    duplicatesSummed > 0 && `${plural(duplicatesSummed, 'duplicate entry', 'duplicate entries')} summed.`,
    zerosDropped > 0 &&
      `${plural(zerosDropped, 'pair')} came to zero and ${zerosDropped === 1 ? 'was' : 'were'} dropped.`,
  ]
    .filter(Boolean)
    .join(' ')
}

/** The first line of the note, then form and sense. */
export function problemSubtitle({ note, form, sense }: Pick<ProblemView, 'note' | 'form' | 'sense'>): string {
  const how = `${FORM_NAMES[form]}, ${senseWord(sense)}.`
  return [note.split('\n')[0]?.trim(), how].filter(Boolean).join(' ')
}

/** The strip of a saved problem. */
export function problemFacts({ structure, best, sense }: ProblemView): Fact[] {
  return [
    { label: 'Variables', value: formatNumber(structure.variables) },
    { label: 'Interactions', value: formatNumber(structure.interactions) },
    ...structureFacts(structure).filter(({ label, value }) => label !== 'Isolated' || value !== '0'),
    best === null
      ? { label: 'Best energy', value: 'no samples yet', word: true }
      : {
          label: 'Best energy',
          value: formatNumber(best),
          note: `${sense === 'min' ? 'lowest' : 'highest'} by majority so far`,
          help: { id: 'bestOfProblem', given: { best, sense } },
        },
  ]
}
