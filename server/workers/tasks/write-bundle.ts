import { createHash } from 'node:crypto'
import type { Control } from '../../../shared/engine/control'
import { writeZip } from '../../../shared/engine/formats/archive'
import { bundleFiles } from '../../bundle/bundle-files'
import type { BundleInput } from '../../bundle/input'

/**
 * The bundle of a run sheet as a ZIP archive with one folder, `RS-<number>/`. `SHA256SUMS` names every other file in the
 * form that `sha256sum -c` reads. The same input gives the same bytes.
 */
export function writeBundle(input: BundleInput, _control: Control<never>): { bytes: Uint8Array } {
  const encoder = new TextEncoder()
  const files = [...bundleFiles(input)].map(([name, text]) => [name, encoder.encode(text)] as const)
  const sums = files.map(([name, bytes]) => `${createHash('sha256').update(bytes).digest('hex')}  ${name}\n`)
  const all = [...files, ['SHA256SUMS', encoder.encode(sums.join(''))] as const]
  return { bytes: writeZip(new Map(all.map(([name, bytes]) => [`RS-${input.sheet.number}/${name}`, bytes]))) }
}
