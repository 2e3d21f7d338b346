import type { z } from 'zod'
import { DomainError } from '../../shared/errors'
import { PROBLEM_FILES } from '../../shared/problem-files'
import type { coefficientsQuerySchema } from '../../shared/schemas/problems'
import type { Actor, App } from '../app'
import { problemData, problemRow } from './problems'

export interface ProblemFile {
  fileName: string
  mediaType: string
  bytes: Uint8Array
}

/**
 * The problem as a file, in either form; offset, sense and labels travel in it.
 * @throws DomainError when the format cannot hold the problem, with the reason
 */
export async function problemFileOf(
  app: App,
  actor: Actor,
  id: string,
  query: z.infer<typeof coefficientsQuerySchema>,
): Promise<ProblemFile> {
  const row = await problemRow(app, actor, id, query.version)
  const { format, ending, title } = PROBLEM_FILES[query.format]
  const form = query.form ?? row.form
  const written = await app.compute.run('writeProblemFile', {
    stored: await problemData(app, row),
    form,
    format,
    sense: row.sense,
    gzip: query.gzip,
  })
  if ('refusal' in written)
    throw new DomainError(
      'not acceptable',
      'coefficients.format',
      `This problem cannot be written as ${title}: ${written.refusal}.`,
    )
  const fileName = `P-${row.number}-${form}.${ending}${query.gzip ? '.gz' : ''}`
  return { fileName, ...written }
}
