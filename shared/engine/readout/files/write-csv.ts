import { strideOf } from '../../sampling/samples'
import type { Samples } from '../../sampling/samples'

/** The text of every byte of eight spins, lowest bit first. */
const spinTexts = (): string[] =>
  Array.from({ length: 256 }, (_, byte) =>
    Array.from({ length: 8 }, (_unused, bit) => ((byte >> bit) & 1 ? '1,' : '-1,')).join(''),
  )

/**
 * Writes samples as `readCsv` reads them: comma-separated ±1 with a header of qubit numbers and a last column `count`,
 * after a column `gauge` where the rows know theirs.
 * @throws RangeError when there are not as many numbers as qubits
 */
export function writeSamplesCsv(
  samples: Samples & { readonly gauges?: Uint32Array | null },
  qubitIds: readonly number[],
): string {
  const { width, rows, bytes, counts, gauges } = samples
  if (qubitIds.length !== width) throw new RangeError(`${qubitIds.length} qubit numbers for samples of width ${width}`)
  const stride = strideOf(width)
  const texts = spinTexts()
  const lines = [[...qubitIds, ...(gauges ? ['gauge'] : []), 'count'].join(',')]
  for (let r = 0; r < rows; r++) {
    let line = ''
    for (let k = 0; k < width >> 3; k++) line += texts[bytes[r * stride + k]!]!
    for (let c = width & ~7; c < width; c++) line += (bytes[r * stride + (c >> 3)]! >> (c & 7)) & 1 ? '1,' : '-1,'
    lines.push(`${line}${gauges ? `${gauges[r]},` : ''}${counts[r]!}`)
  }
  return lines.join('\n') + '\n'
}
