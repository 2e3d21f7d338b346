import { createHash } from 'node:crypto'
import type { CustomGraph } from '../../shared/engine/machine/fabric'
import { familyName } from '../../shared/engine/machine/family'
import type { GraphFormat } from '../../shared/engine/machine/graph-files/graph-file'
import { DomainError } from '../../shared/errors'
import { GRAPH_FILES } from '../../shared/graph-files'
import type { MachineUpload, UploadedGraph, UploadedMachine } from '../../shared/schemas/machine-uploads'
import type { Actor, App } from '../app'
import type { TaskOutput } from '../workers/tasks'
import { packFabric, unpackFabric } from './custom-graphs'
import { addMachine } from './machine-creation'
import type { ReadingWatch, UploadedFile } from './problem-upload'
import { Recent } from './recent'

type Read = TaskOutput<'readMachineGraph'>
type ReadMachine = NonNullable<Read['machine']>

/** By content and format, so that saving what was just looked at reads and draws it only once. */
const readings = new Recent<Read>(2)

async function readingOf(
  app: App,
  { bytes }: UploadedFile,
  format: GraphFormat | undefined,
  { signal, onProgress }: ReadingWatch,
): Promise<Read> {
  const key = `${createHash('sha256').update(bytes).digest('hex')} ${format ?? ''}`
  const known = readings.peek(key)
  if (known) return known
  const read = await app.compute.run(
    'readMachineGraph',
    { bytes, format },
    { signal, onProgress: ({ bytes: done }) => onProgress?.(done) },
  )
  // One that was stopped half-way says nothing about the file.
  return signal?.aborted ? read : readings.get(key, () => read)
}

function refused(file: UploadedFile, { reading }: Read): DomainError {
  const { format, issues, issueCount } = reading
  const first = issues[0]!
  const where = first.line === undefined ? '' : `line ${first.line}: `
  const found =
    issueCount === 1
      ? `One thing is wrong: ${where}${first.message}.`
      : `${issueCount} things are wrong; first ${where}${first.message}.`
  return new DomainError(
    'not acceptable',
    'machine.graph',
    `${file.name} holds no machine graph that can be taken, read as ${GRAPH_FILES[format].name}. ${found}`,
    issues,
  )
}

/** The same graph has the same fingerprint, whatever file it came in. */
function customGraph(file: UploadedFile, machine: ReadMachine, packed: Uint8Array): CustomGraph {
  const { figures, positions } = machine
  const fingerprint = createHash('sha256').update(packed).digest('hex')
  const { qubits, couplers } = figures
  return { kind: 'custom', file: file.name, qubits, couplers, fingerprint, positions }
}

/**
 * Reads a graph file and, unless it is only looked at, adds the machine with its first calibration.
 * @throws DomainError naming every line of the file, or field, that cannot be taken
 */
export async function uploadMachine(
  app: App,
  actor: Actor,
  file: UploadedFile,
  { dryRun, format, machine: input }: MachineUpload,
  watch: ReadingWatch = {},
): Promise<UploadedGraph | UploadedMachine> {
  const read = await readingOf(app, file, format, watch)
  if (!read.machine) throw refused(file, read)
  const packed = packFabric(read.machine)
  const family = customGraph(file, read.machine, packed)
  const { reading, machine } = read
  const graph: UploadedGraph = {
    graph: familyName(family),
    format: reading.format,
    formatSource: reading.formatSource,
    positions: machine.positions,
    fingerprint: family.fingerprint,
    ...machine.figures,
  }
  if (dryRun) return graph
  if (!input)
    throw new DomainError(
      'unreadable',
      'upload.machine',
      'The form says nothing of the machine. Send its name and figures as JSON in the part named “machine”.',
    )
  return { ...graph, ...(await addMachine(app, actor, input, unpackFabric(family, packed), packed)) }
}
