import type { Control } from '../../../shared/engine/control'
import { writeSamplesCsv } from '../../../shared/engine/readout/files/write-csv'
import type { SampleRows } from '../../../shared/engine/sampling/samples'

export interface WriteSamplesInput {
  samples: SampleRows
  qubitIds: number[]
}

/** The UTF-8 text of samples as CSV with a header of qubit numbers. */
export function writeSamplesFile({ samples, qubitIds }: WriteSamplesInput, _control: Control<never>) {
  return { bytes: new TextEncoder().encode(writeSamplesCsv(samples, qubitIds)) }
}
