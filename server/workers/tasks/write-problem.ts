import type { Control } from '../../../shared/engine/control'
import { formatById } from '../../../shared/engine/formats'
import { gzip as packed } from '../../../shared/engine/formats/archive'
import { convertForm } from '../../../shared/engine/problem/convert'
import type { Problem } from '../../../shared/engine/problem/problem'

type Form = 'qubo' | 'ising'

export interface WriteProblemInput {
  /** A problem as it is stored: to be minimised, in the form that it came in. */
  stored: { form: Form; labels: string[]; problem: Problem }
  form: Form
  /** Identifier of a format. */
  format: string
  sense: 'min' | 'max'
  gzip: boolean
}

/** A problem file in either form, or why the format cannot hold the problem. */
export function writeProblemFile(
  { stored, form, format, sense, gzip }: WriteProblemInput,
  _control: Control<never>,
): { bytes: Uint8Array; mediaType: string } | { refusal: string } {
  const { write, mediaType } = formatById(format)
  try {
    const problem = convertForm(stored.problem, stored.form, form)
    const bytes = write({ form, labels: stored.labels, problem, sense })
    return gzip ? { bytes: packed(bytes), mediaType: 'application/gzip' } : { bytes, mediaType }
  } catch (error) {
    if (error instanceof RangeError) return { refusal: error.message }
    throw error
  }
}
