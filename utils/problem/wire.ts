import type { ProblemView } from '#shared/schemas/problems'
import type { RunSheetState } from '#shared/schemas/run-sheets'
import type { WireStage } from '../ui/parts'
import { formatCount } from '../format'

/** Farthest last: what a problem has reached is the farthest of its run sheets. */
const ORDER: readonly RunSheetState[] = ['draft', 'sent back', 'in review', 'approved', 'issued', 'returned', 'closed']
const reaches = (state: RunSheetState, least: RunSheetState): boolean => ORDER.indexOf(state) >= ORDER.indexOf(least)

const NOT_YET = { note: 'not yet', state: 'not yet' } as const

type Embeddings = ProblemView['embeddings']
type Sheet = Embeddings[number]['runSheets'][number]

function embeddingStage(embeddings: Embeddings, of: Sheet | undefined): WireStage {
  const label = 'Embedding'
  const carrier = embeddings.find(({ runSheets }) => of && runSheets.includes(of))
  const found = carrier ?? embeddings.find(({ status }) => status === 'found')
  if (found) return { label, note: `E-${found.number}`, state: 'done', to: `/embeddings/${found.id}` }
  const running = embeddings.find(({ status }) => status === 'running')
  if (running) return { label, note: 'searching', state: 'under way', to: `/embeddings/${running.id}` }
  return embeddings.length > 0 ? { label, note: 'none found yet', state: 'under way' } : { label, ...NOT_YET }
}

function sheetStages(sheet: Sheet | undefined): WireStage[] {
  if (!sheet) return ['Strength', 'Run sheet', 'Samples'].map((label) => ({ label, ...NOT_YET }))
  const to = `/run-sheets/${sheet.id}`
  const isSettled = reaches(sheet.state, 'approved')
  const note = `RS-${sheet.number}`
  return [
    {
      label: 'Strength',
      note: isSettled ? 'settled' : 'being tuned',
      state: isSettled ? 'done' : 'under way',
      to: `${to}#strength`,
    },
    { label: 'Run sheet', note: `${note} ${sheet.state}`, state: isSettled ? 'done' : 'under way', to },
    reaches(sheet.state, 'returned')
      ? { label: 'Samples', note: 'returned', state: 'done', to: `${to}#samples` }
      : { label: 'Samples', note: 'not yet', state: sheet.state === 'issued' ? 'under way' : 'not yet' },
  ]
}

/** The six stages of the work, seen from the problem: as far as any of its run sheets has come. */
export function problemWire({ variables, embeddings }: Pick<ProblemView, 'variables' | 'embeddings'>): WireStage[] {
  const sheets = embeddings.flatMap(({ runSheets }) => runSheets)
  const farthest = [...sheets].sort((a, b) => ORDER.indexOf(b.state) - ORDER.indexOf(a.state) || b.number - a.number)[0]
  return [
    { label: 'Problem', note: formatCount(variables, 'variable'), state: 'done' },
    embeddingStage(embeddings, farthest),
    ...sheetStages(farthest),
    { label: 'Answer', ...NOT_YET },
  ]
}
