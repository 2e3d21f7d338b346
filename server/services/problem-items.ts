import type { ProblemState } from '../../shared/library'
import type { ProblemItem } from '../../shared/schemas/problems'
import type { App } from '../app'
import { embeddingsOfProblems } from '../database/repositories/embeddings'
import type { ProblemRow } from '../database/repositories/problems'
import { returnsOfRunSheets, runSheetsOfEmbeddings } from '../database/repositories/run-sheets'
import { signed, signOf } from './sense'

export type ProblemContext = Awaited<ReturnType<typeof contextOf>>
type Made = ProblemContext['embeddings'][number]
type Sheet = ProblemContext['sheets'][number]

/** What was built on several problems, fetched together. */
export async function contextOf(app: App, problemIds: string[]) {
  const embeddings = await embeddingsOfProblems(app.db, problemIds)
  const sheets = await runSheetsOfEmbeddings(
    app.db,
    embeddings.map(({ embedding }) => embedding.id),
  )
  const returned = await returnsOfRunSheets(
    app.db,
    sheets.map((sheet) => sheet.id),
  )
  return { embeddings, sheets, returned }
}

/** Of the current version, then chosen, then found: a later search that found nothing does not hide what was found. */
function shownEmbedding(row: ProblemRow, own: readonly Made[]): Made | undefined {
  const rank = ({ embedding }: Made): number =>
    (embedding.problemVersion === row.currentVersion ? 4 : 0) +
    (embedding.chosen ? 2 : 0) +
    (embedding.status === 'found' ? 1 : 0)
  return own.reduce<Made | undefined>((best, made) => (best && rank(best) >= rank(made) ? best : made), undefined)
}

function stateOf(shown: Made | undefined, isCurrent: boolean, sheet: Sheet | undefined): ProblemState {
  if (sheet) return sheet.state
  if (!shown) return 'not embedded'
  const { status } = shown.embedding
  if (status === 'found') return isCurrent ? 'embedded' : 'to carry over'
  return status === 'running' ? 'searching' : 'none found'
}

/** A problem as it stands in the library; the best energy is of its version given, the rest of all, the current first. */
export function itemOf(row: ProblemRow, { embeddings, sheets, returned }: ProblemContext): ProblemItem {
  const own = embeddings.filter(({ embedding }) => embedding.problemId === row.id)
  const versions = new Map(own.map(({ embedding }) => [embedding.id, embedding.problemVersion]))
  const shown = shownEmbedding(row, own)
  const isCurrent = shown?.embedding.problemVersion === row.currentVersion
  const ownSheets = sheets.filter(({ embeddingId }) => versions.has(embeddingId))
  const currentSheet = ownSheets.find(({ embeddingId }) => versions.get(embeddingId) === row.currentVersion)
  const sheet = currentSheet ?? ownSheets[0]
  const sheetsOfVersion = new Set(
    ownSheets.filter(({ embeddingId }) => versions.get(embeddingId) === row.version).map(({ id }) => id),
  )
  const sign = signOf(row.sense)
  const energies = returned
    .filter(({ best, runSheetId }) => best !== null && sheetsOfVersion.has(runSheetId))
    .map(({ best }) => sign * best!)
  return {
    id: row.id,
    number: row.number,
    name: row.name,
    form: row.form,
    sense: row.sense,
    variables: row.variables,
    interactions: row.interactions,
    density: row.structure.density,
    tags: row.tags,
    state: stateOf(shown, isCurrent, currentSheet),
    currentVersion: row.currentVersion,
    embedding: shown
      ? {
          id: shown.embedding.id,
          number: shown.embedding.number,
          status: shown.embedding.status,
          machine: shown.machine,
          longestChain: shown.embedding.stats?.chainLength.max ?? null,
          ofVersion: shown.embedding.problemVersion,
        }
      : null,
    runSheet: sheet
      ? { id: sheet.id, number: sheet.number, state: sheet.state, ofVersion: versions.get(sheet.embeddingId)! }
      : null,
    best:
      energies.length > 0
        ? signed(
            sign,
            energies.reduce((least, energy) => Math.min(least, energy)),
          )
        : null,
    changedAt: row.changedAt.toISOString(),
  }
}
