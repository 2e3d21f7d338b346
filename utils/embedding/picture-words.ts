import type { EmbeddingView } from '#shared/schemas/embeddings'
import { formatCount } from '../format'
import type { ChainLayer } from '../lattice/types'

type Named = Pick<EmbeddingView, 'number' | 'problem' | 'machine' | 'calibration' | 'calibrationInForce'>

/** Title, facts and file name of a saved picture of an embedding. */
export function pictureWords(
  { number, problem, machine, calibration, calibrationInForce }: Named,
  { labels, qubits }: Pick<ChainLayer, 'labels' | 'qubits'>,
  isUnsaved: boolean,
  remark: string,
) {
  const edited = isUnsaved ? ', edited by hand and not saved' : ''
  const at = isUnsaved ? calibrationInForce : calibration
  return {
    title: `${problem.name} on ${machine.name}, E-${number}${edited}`,
    facts: `${formatCount(labels.length, 'chain')} on ${formatCount(qubits.length, 'qubit')} of ${machine.family}, calibration ${at}.`,
    remark,
    name: [`E-${number}`, problem.name, 'on', machine.name, ...(isUnsaved ? ['edited'] : [])],
  }
}

/** Where chains are edited at a later calibration than they were made at. */
export const calibrationNote = ({ calibration, calibrationInForce }: Named): string =>
  calibration === calibrationInForce
    ? ''
    : `The lattice is that of calibration ${calibrationInForce}, the one in force; the embedding was made at ${calibration}.`
