import type { EmbeddingStatus, EmbeddingView } from '#shared/schemas/embeddings'
import type { StageState, WireStage } from '../ui/parts'
import type { ChainFindings } from './layers'
import { formatNumber } from '../format'
import { strengthText } from '../run-sheet/strength'

/** States from which on a run sheet is settled. */
const SETTLED: readonly string[] = ['approved', 'issued', 'returned', 'closed']

const STAGE: Record<EmbeddingStatus, StageState> = {
  running: 'under way',
  found: 'done',
  'none found': 'under way',
  cancelled: 'under way',
  failed: 'under way',
}

function samplesStage({ samples }: Pick<ChainFindings, 'samples'>): WireStage {
  if (!samples) return { label: 'Samples', note: 'not yet', state: 'not yet' }
  const isRehearsal = samples.source === 'rehearsal'
  return {
    label: 'Samples',
    note: isRehearsal ? 'rehearsal' : `${formatNumber(samples.reads)} reads`,
    state: isRehearsal ? 'under way' : 'done',
    to: `/returns/${samples.id}`,
  }
}

/** The three stages after the embedding, as far as the run sheet in view has come. */
function laterStages(embedding: EmbeddingView, findings: ChainFindings | null): WireStage[] {
  const sheet = findings?.runSheet ?? embedding.runSheets.at(-1)
  if (!sheet)
    return ['Strength', 'Run sheet', 'Samples'].map((label) => ({ label, note: 'not yet', state: 'not yet' as const }))
  const chosen = findings?.runSheet.rules.find(({ selected }) => selected)
  const to = `/run-sheets/${sheet.id}`
  return [
    {
      label: 'Strength',
      note: chosen ? `k = ${strengthText(chosen.k)}` : undefined,
      state: 'done',
      to: `${to}#strength`,
    },
    {
      label: 'Run sheet',
      note: `RS-${sheet.number} ${sheet.state}`,
      state: SETTLED.includes(sheet.state) ? 'done' : 'under way',
      to,
    },
    samplesStage({ samples: findings?.samples ?? null }),
  ]
}

/** The six stages of the work, seen from an embedding. */
export function embeddingWire(embedding: EmbeddingView, findings: ChainFindings | null): WireStage[] {
  const { problem, number, status } = embedding
  return [
    {
      label: 'Problem',
      note: `${formatNumber(problem.variables)} variables`,
      state: 'done',
      to: `/problems/${problem.id}`,
    },
    { label: 'Embedding', note: `E-${number}`, state: STAGE[status] },
    ...laterStages(embedding, findings),
    { label: 'Answer', note: 'not yet', state: 'not yet' },
  ]
}
