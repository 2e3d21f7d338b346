import type { ReturnView } from '#shared/schemas/returns'
import { formatNumber } from '../format'
import { formatDuration } from '../formatTime'

export interface MadeRow {
  label: string
  value: string
  note?: string
}

const number = (value: ReturnView['made'][string] | undefined): string =>
  typeof value === 'number' ? formatNumber(value) : '–'

function rehearsalRows({ made, seconds }: ReturnView): MadeRow[] {
  return [
    { label: 'Method', value: 'simulated annealing', note: 'of the programmed values, a classical stand-in' },
    { label: 'Reads asked for', value: number(made.reads) },
    { label: 'Sweeps a read', value: number(made.sweeps) },
    { label: 'Final temperature', value: number(made.temperature), note: 'in units of the programmed values' },
    {
      label: 'Control error',
      value: made.controlError ? 'drawn' : 'left out',
      note: made.controlError ? 'one draw in each gauge' : 'values as programmed, exactly',
    },
    { label: 'Seed', value: number(made.seed) },
    { label: 'Took', value: formatDuration(seconds), note: 'of computing, not machine time' },
  ]
}

function uploadRows({ made }: ReturnView): MadeRow[] {
  return [
    { label: 'File', value: String(made.file ?? '–') },
    { label: 'SHA-256', value: String(made.sha256 ?? '–') },
    { label: 'Values', value: String(made.values ?? '–'), note: 'as written in the file' },
    {
      label: 'Machine time',
      value: typeof made.machineTimeSeconds === 'number' ? formatDuration(made.machineTimeSeconds) : 'not told',
      note: 'as entered with the file',
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
