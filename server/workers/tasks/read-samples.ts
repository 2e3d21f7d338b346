import type { Control } from '../../../shared/engine/control'
import type { SamplesCsv } from '../../../shared/engine/readout/samples-csv'
import { readSamplesCsv } from '../../../shared/engine/readout/samples-csv'

export interface ReadSamplesInput {
  bytes: Uint8Array
  /** Published numbers of the run sheet's qubits, in the order of its programmed values. */
  qubitIds: number[]
}

/** Reads returned samples; null when the bytes are not text. */
export function readSamplesFile({ bytes, qubitIds }: ReadSamplesInput, _control: Control<never>): SamplesCsv | null {
  let text: string
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return null
  }
  return readSamplesCsv(text, { qubitIds })
}
