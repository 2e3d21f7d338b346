import type { ReturnView } from '#shared/schemas/returns'
import type { Arithmetic } from '#shared/engine/sampling/arithmetic'
import { formatNumber, formatSignificant } from '../format'
import { formatDuration } from '../formatTime'
import { STEPS } from '../help/rehearsal'
import type { HelpRequest } from '../help/registry'
import { roundingHelp, roundingWords } from '../run-sheet/rehearsal'

export interface MadeRow {
  label: string
  value: string
  note?: string
  /** How a computed value came about. */
  help?: HelpRequest
  name?: string
}

const number = (value: ReturnView['made'][string] | undefined): string =>
  typeof value === 'number' ? formatNumber(value) : '–'

/** How numbers were held; nothing of rehearsals from before there was a choice, which were in double precision. */
function arithmeticRows({ made }: ReturnView): MadeRow[] {
  if (typeof made.arithmetic !== 'string' || typeof made.rounding !== 'number') return []
  const arithmetic = made.arithmetic as Arithmetic
  const sigma = made.controlError ? Math.min(Number(made.sigmaH), Number(made.sigmaJ)) : null
  const facts = { arithmetic, rounding: made.rounding, sigma }
  const largestField = arithmetic === '64-bit' ? 0 : 2 * STEPS[arithmetic] * made.rounding
  return [
    {
      label: 'Arithmetic',
      value: arithmetic,
      note: roundingWords(facts),
      ...roundingHelp(facts, largestField),
    },
  ]
}

function annealingRows(samples: ReturnView): MadeRow[] {
  const { made } = samples
  return [
    { label: 'Sweeps a read', value: number(made.sweeps) },
    { label: 'Final temperature', value: number(made.temperature), note: 'In units of the programmed values.' },
    ...arithmeticRows(samples),
  ]
}

function pathRows({ made }: ReturnView): MadeRow[] {
  const slices = Number(made.slices)
  return [
    { label: 'Sweeps a read', value: number(made.sweeps), note: 'no time of the machine' },
    {
      label: 'Slices',
      value: number(made.slices),
      help: { id: 'slices', given: { slices } },
      name: 'the number of slices',
    },
    {
      label: 'Temperature at s = 1',
      value: formatSignificant(Number(made.temperature), 3),
      note: 'the machine’s, in units of the programmed values',
    },
    { label: 'Schedule', value: 'of the run sheet', note: 'as it was then' },
  ]
}

function rehearsalRows(samples: ReturnView): MadeRow[] {
  const { made, seconds } = samples
  const isPath = made.model === 'path-integral'
  return [
    isPath
      ? {
          label: 'Method',
          value: 'path-integral Monte Carlo',
          note: 'along A(s) and B(s) of the machine sheet, a classical stand-in',
        }
      : { label: 'Method', value: 'simulated annealing', note: 'of the programmed values, a classical stand-in' },
    { label: 'Reads asked for', value: number(made.reads) },
    ...(isPath ? pathRows(samples) : annealingRows(samples)),
    {
      label: 'Control error',
      value: made.controlError ? 'drawn' : 'left out',
      note: made.controlError ? 'one draw in each gauge' : 'values as programmed, exactly',
    },
    { label: 'Seed', value: number(made.seed) },
    ...(made.byBridge ? [{ label: 'Sent by', value: 'the built-in bridge' }] : []),
    ...(seconds === null
      ? []
      : [{ label: 'Took', value: formatDuration(seconds), note: 'of computing, not machine time' }]),
  ]
}

const FORMATS: Record<string, string> = {
  csv: 'table',
  npy: 'NumPy array',
  npz: 'NumPy archive',
  json: 'JSON document',
}
const COLUMNS: Record<string, string> = {
  file: 'as the file names them',
  given: 'in the order given with the file',
  bundle: 'in the order of the bundle, ascending',
}

/** What was understood of a file; nothing of files from before this was kept. */
function readingRows({ format, container, columns, gauges, gaugesKnown }: ReturnView['made']): MadeRow[] {
  if (typeof format !== 'string') return []
  const packed = container === 'gzip' ? ', gzip' : ''
  return [
    { label: 'Format', value: `${FORMATS[format]}${packed}` },
    { label: 'Qubits', value: COLUMNS[String(columns)] ?? '–' },
    {
      label: 'Gauges',
      value: gauges === 'as read' ? 'undone here' : 'undone before',
      note: gaugesKnown ? 'the rows say theirs' : 'the rows do not say theirs',
    },
  ]
}

function uploadRows({ made }: ReturnView): MadeRow[] {
  return [
    { label: 'File', value: String(made.file ?? '–') },
    ...(made.byBridge ? [{ label: 'Sent by', value: 'the bridge of the machine' }] : []),
    { label: 'SHA-256', value: String(made.sha256 ?? '–') },
    { label: 'Values', value: String(made.values ?? '–'), note: 'as written in the file' },
    ...readingRows(made),
    {
      label: 'Machine time',
      value: typeof made.machineTimeSeconds === 'number' ? formatDuration(made.machineTimeSeconds) : 'not told',
      note: 'of all reads, as entered with the file or in it',
    },
  ]
}

/** How a set of samples came to be, row by row. */
export function madeRows(samples: ReturnView): MadeRow[] {
  return [
    ...(samples.source === 'rehearsal' ? rehearsalRows(samples) : uploadRows(samples)),
    { label: 'Espalier', value: samples.version, note: 'the version that stored these samples' },
  ]
}

/** `Rehearsal 2`, `Samples 1`. */
export const samplesTitle = ({ source, number }: Pick<ReturnView, 'source' | 'number'>): string =>
  `${source === 'rehearsal' ? 'Rehearsal' : 'Samples'} ${number}`
