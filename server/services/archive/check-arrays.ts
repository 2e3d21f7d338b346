import { createHash } from 'node:crypto'
import type { Embedding } from '../../../shared/engine/embedding/embedding'
import { applyDefects } from '../../../shared/engine/machine/defects'
import type { CustomGraph, Fabric, PublishedFamily, WorkingGraph } from '../../../shared/engine/machine/fabric'
import { familyProblems } from '../../../shared/engine/machine/family'
import { convertForm } from '../../../shared/engine/problem/convert'
import { interactionGraph } from '../../../shared/engine/problem/interaction-graph'
import { strideOf } from '../../../shared/engine/sampling/samples'
import type { MachineSheet } from '../../../shared/schemas/machines'
import type { ConstraintGroup } from '../../../shared/schemas/problems'
import type { RunSheetSettings } from '../../../shared/schemas/run-sheets'
import type { App } from '../../app'
import type { WorkRow } from '../../database/repositories/workspace-rows'
import { unpackChains } from '../chains'
import { unpackFabric } from '../custom-graphs'
import { fabricOf } from '../machine-graphs'
import type { ProblemData } from '../problem-data'
import { unpackProblem } from '../problem-data'
import { fingerprintOf, programmeBench } from '../programming'
import { Recent } from '../recent'
import { unpackRecord } from '../reduction-record'
import { unpackSamples } from '../samples-data'
import { checkedSheet } from '../saved-calibrations'
import { notReadable } from './read-rows'

const sha256 = (bytes: Uint8Array): string => createHash('sha256').update(bytes).digest('hex')

/** What cannot even be unpacked is as wrong as what does not fit. */
function unpacked<T>(what: string, read: () => T): T {
  try {
    return read()
  } catch (error) {
    throw notReadable(`${what} does not unpack (${error instanceof Error ? error.message : String(error)})`)
  }
}

const areFinite = (values: Float64Array): boolean => values.every((value) => Number.isFinite(value))

function fitsProblem({ labels, problem }: ProblemData, row: WorkRow): boolean {
  const { n, linear, rows, cols, values, offset } = problem
  if (n !== row.variables || labels.length !== n || values.length !== row.interactions) return false
  if (rows.length !== values.length || cols.length !== values.length) return false
  if (!labels.every((label) => typeof label === 'string' && label !== '') || new Set(labels).size !== n) return false
  if (!areFinite(linear) || !areFinite(values) || !Number.isFinite(offset)) return false
  return rows.every((row, k) => row < cols[k]! && cols[k]! < n)
}

function fitsChains({ offsets, qubits }: Embedding, variables: number, order: number): boolean {
  if (offsets.length !== variables + 1 || offsets[0] !== 0 || offsets[variables] !== qubits.length) return false
  return offsets.every((at, i) => i === 0 || at >= offsets[i - 1]!) && qubits.every((qubit) => qubit < order)
}

/** Rows of an archive with the arrays that they name, as far as one check needs others. */
export interface ArchiveSource {
  bytes(blobId: string): Promise<Uint8Array>
  problemVersion(problemId: string, version: number): WorkRow | undefined
  machine(id: string): WorkRow | undefined
  calibration(machineId: string, number: number): WorkRow | undefined
}

/**
 * Holds the arrays of an archive against what its rows say of them. Fingerprints have to be the ones that were exported, and
 * embeddings have to hold by the definition: an archive may have been made by anybody.
 */
export class ArrayChecks {
  private readonly problems = new Recent<Promise<ProblemData>>(4)
  private readonly fabrics = new Recent<Promise<Fabric>>(4)
  private readonly workings = new Recent<Promise<WorkingGraph>>(4)

  constructor(
    private readonly app: App,
    private readonly source: ArchiveSource,
  ) {}

  async problemVersion(row: WorkRow): Promise<void> {
    const bytes = await this.source.bytes(row.dataBlobId as string)
    if (sha256(bytes) !== row.fingerprint) throw notReadable('a problem has another fingerprint than was exported')
    const data = unpacked('a problem', () => unpackProblem(bytes))
    const groups = (row.groups as ConstraintGroup[] | null) ?? []
    const isInside = groups.every(({ members }) => members.every((member) => member < data.problem.n))
    if (data.form !== row.form || !fitsProblem(data, row) || !isInside)
      throw notReadable('the coefficients of a problem are not what is said of them')
  }

  async machine(row: WorkRow): Promise<void> {
    const family = row.family as PublishedFamily | CustomGraph
    if (family.kind === 'custom') await this.fabric(row)
    else if (familyProblems(family).length > 0) throw notReadable(`a machine cannot be: ${familyProblems(family)[0]}`)
  }

  async calibration(row: WorkRow): Promise<void> {
    checkedSheet(await this.fabricOf(row.machineId as string), row.sheet as MachineSheet)
  }

  async embedding(row: WorkRow): Promise<void> {
    if (row.chainsBlobId === null) {
      if (row.status === 'found') throw notReadable('an embedding that was found has no chains')
      return
    }
    const chains = await this.chains(row)
    if (row.status !== 'found') return
    const { graph, usable } = await this.working(row)
    const { labels, problem } = await this.problem(row)
    const { ids } = await this.fabricOf(row.machineId as string)
    const task = { problem: interactionGraph(problem), machine: graph, usable }
    const { violations } = await this.app.compute.run('checkEmbedding', { task, embedding: chains, labels, ids })
    if (violations.length > 0) throw notReadable(`embedding ${row.number} does not hold: ${violations[0]!.message}`)
  }

  async reduction(row: WorkRow): Promise<void> {
    const bytes = await this.source.bytes(row.blobId as string)
    const { levels } = unpacked('a reduction', () => unpackRecord(bytes))
    const fits = levels.every(({ labels, kept, variables, steps }) => {
      const isInside = (index: number): boolean => index < variables
      return labels.length === variables && kept.every(isInside) && steps.variable.every(isInside)
    })
    if (levels.length === 0 || !fits) throw notReadable('a reduction does not fit its problem')
  }

  async reference(row: WorkRow): Promise<void> {
    if (row.stateBlobId === null) return
    const state = await this.source.bytes(row.stateBlobId as string)
    if (state.length !== this.version(row).variables) throw notReadable('a reference optimum has another length')
  }

  async samples(row: WorkRow, embedding: WorkRow): Promise<void> {
    if (row.samplesBlobId === null) return
    const bytes = await this.source.bytes(row.samplesBlobId as string)
    const samples = unpacked('samples', () => unpackSamples(bytes))
    const { width, rows, counts, gauges, energies } = samples
    const { qubits } = await this.chains(embedding)
    const lengths = [counts.length, gauges?.length ?? rows, energies?.length ?? rows]
    const isWhole = lengths.every((length) => length === rows) && samples.bytes.length === rows * strideOf(width)
    if (width !== qubits.length || !isWhole) throw notReadable('samples do not fit their embedding')
  }

  /** Whether a frozen run sheet gives the values here that were agreed to there. */
  async isAsAgreed(row: WorkRow, embedding: WorkRow): Promise<boolean> {
    const [{ labels, form, problem }, { graph }] = [await this.problem(embedding), await this.working(embedding)]
    const sheet = this.sheet(embedding)
    const bench = { labels, ising: convertForm(problem, form, 'ising'), embedding: await this.chains(embedding) }
    const { result } = programmeBench({ ...bench, machine: { graph, sheet } }, row.settings as RunSheetSettings)
    return result.programmed !== null && fingerprintOf(result.programmed) === row.fingerprint
  }

  /** Chains of an embedding, every qubit of them one of its machine. */
  private async chains(row: WorkRow): Promise<Embedding> {
    const bytes = await this.source.bytes(row.chainsBlobId as string)
    if (row.status === 'found' && sha256(bytes) !== row.fingerprint)
      throw notReadable(`embedding ${row.number} has another fingerprint than was exported`)
    const chains = unpacked('an embedding', () => unpackChains(bytes))
    const { graph } = await this.fabricOf(row.machineId as string)
    if (!fitsChains(chains, this.version(row).variables as number, graph.order))
      throw notReadable(`the chains of embedding ${row.number} do not fit its problem and machine`)
    return chains
  }

  private problem(row: WorkRow): Promise<ProblemData> {
    const blobId = this.version(row).dataBlobId as string
    return this.problems.get(blobId, async () => unpackProblem(await this.source.bytes(blobId)))
  }

  private working(row: WorkRow): Promise<WorkingGraph> {
    const machineId = row.machineId as string
    const { defects } = this.sheet(row)
    return this.workings.get(`${machineId} ${String(row.calibration)}`, async () =>
      applyDefects(await this.fabricOf(machineId), defects),
    )
  }

  private sheet(row: WorkRow): MachineSheet {
    const found = this.source.calibration(row.machineId as string, row.calibration as number)
    if (!found) throw notReadable(`calibration ${String(row.calibration)} of a machine is missing`)
    return found.sheet as MachineSheet
  }

  private version(row: WorkRow): WorkRow {
    const found = this.source.problemVersion(row.problemId as string, row.problemVersion as number)
    if (!found) throw notReadable(`version ${String(row.problemVersion)} of a problem is missing`)
    return found
  }

  private fabricOf(machineId: string): Promise<Fabric> {
    const row = this.source.machine(machineId)
    if (!row) throw notReadable('a machine is missing')
    return this.fabric(row)
  }

  private fabric(row: WorkRow): Promise<Fabric> {
    const family = row.family as PublishedFamily | CustomGraph
    if (family.kind !== 'custom') return fabricOf(this.app, family)
    return this.fabrics.get(row.id as string, async () => {
      if (typeof row.graphBlobId !== 'string') throw notReadable('a machine of no family has no graph')
      const bytes = await this.source.bytes(row.graphBlobId)
      if (sha256(bytes) !== family.fingerprint) throw notReadable('the graph of a machine has another fingerprint')
      const fabric = unpacked('the graph of a machine', () => unpackFabric(family, bytes))
      const { order, ends } = fabric.graph
      if (!ends.every((end) => end < order)) throw notReadable('the graph of a machine names a qubit that it lacks')
      return fabric
    })
  }
}
