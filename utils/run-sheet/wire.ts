import type { ReturnView } from '#shared/schemas/returns'
import type { RunSheetState, RunSheetView } from '#shared/schemas/run-sheets'
import type { WireStage } from '../ui/parts'
import { formatNumber } from '../format'
import { strengthText } from './strength'

/** States from which on a run sheet is settled. */
const SETTLED: readonly RunSheetState[] = ['approved', 'issued', 'returned', 'closed']

/** The six stages of the work, seen from a run sheet. */
export function runSheetWire(sheet: RunSheetView): WireStage[] {
  const returned = sheet.returns.find(({ source, status }) => source === 'upload' && status === 'ready')
  const chosen = sheet.rules.find(({ selected }) => selected)
  return [
    {
      label: 'Problem',
      note: `${formatNumber(sheet.ising.variables)} variables`,
      state: 'done',
      to: `/problems/${sheet.problem.id}`,
    },
    { label: 'Embedding', note: `E-${sheet.embedding.number}`, state: 'done', to: `/embeddings/${sheet.embedding.id}` },
    { label: 'Strength', note: chosen ? `k = ${strengthText(chosen.k)}` : undefined, state: 'done', to: '#strength' },
    {
      label: 'Run sheet',
      note: `RS-${sheet.number} ${sheet.state}`,
      state: SETTLED.includes(sheet.state) ? 'done' : 'under way',
    },
    returned
      ? {
          label: 'Samples',
          note: `${formatNumber(returned.reads)} reads`,
          state: 'done',
          to: `/returns/${returned.id}`,
        }
      : { label: 'Samples', note: 'not yet', state: sheet.state === 'issued' ? 'under way' : 'not yet' },
    { label: 'Answer', note: 'not yet', state: 'not yet' },
  ]
}

/** The same stages, seen from a set of samples. */
export function returnWire(samples: ReturnView): WireStage[] {
  const { problem, embedding, runSheet } = samples
  const joined = samples.breaks?.chains.filter(({ length }) => length > 1) ?? []
  const strengths = joined.map(({ strength }) => strength)
  const k = { min: Math.min(...strengths), max: Math.max(...strengths) }
  const sheetPath = `/run-sheets/${runSheet.id}`
  return [
    {
      label: 'Problem',
      note: `${formatNumber(problem.variables)} variables`,
      state: 'done',
      to: `/problems/${problem.id}`,
    },
    { label: 'Embedding', note: `E-${embedding.number}`, state: 'done', to: `/embeddings/${embedding.id}` },
    {
      label: 'Strength',
      note: strengths.length > 0 ? `k = ${strengthText(k)}` : undefined,
      state: 'done',
      to: `${sheetPath}#strength`,
    },
    {
      label: 'Run sheet',
      note: `RS-${runSheet.number} ${runSheet.state}`,
      state: SETTLED.includes(runSheet.state as RunSheetState) ? 'done' : 'under way',
      to: sheetPath,
    },
    {
      label: 'Samples',
      note: samples.source === 'rehearsal' ? 'rehearsal' : `${formatNumber(samples.reads)} reads`,
      state: samples.source === 'upload' && samples.status === 'ready' ? 'done' : 'under way',
    },
    { label: 'Answer', note: 'not yet', state: 'not yet' },
  ]
}
