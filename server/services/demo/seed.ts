import { writeSamplesCsv } from '../../../shared/engine/readout/files/write-csv'
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from '../../../shared/demo-accounts'
import { createRandom } from '../../../shared/engine/random'
import type { Fabric, PublishedFamily } from '../../../shared/engine/machine/fabric'
import { createEmbeddingSchema } from '../../../shared/schemas/embeddings'
import { createMachineSchema } from '../../../shared/schemas/machines'
import { saveGroupsSchema } from '../../../shared/schemas/groups'
import { uploadProblemSchema } from '../../../shared/schemas/problems'
import { startReferenceSchema } from '../../../shared/schemas/reference'
import { uploadReturnSchema } from '../../../shared/schemas/returns'
import { createRunSheetSchema } from '../../../shared/schemas/run-sheets'
import type { Actor, App } from '../../app'
import { anyUser, keepFact, readFact, setFact, takeFact } from '../../database/repositories/people'
import { findJob } from '../../database/repositories/jobs'
import { saveBridge } from '../bridges'
import { grantTime } from '../budget'
import { startEmbedding } from '../embeddings'
import { SEEDED_AT } from '../first-steps'
import { fabricOf } from '../machine-graphs'
import { createMachine } from '../machine-creation'
import { calibrateMachine } from '../machines'
import type { Passwords } from '../people'
import { createAccount, createWorkspace } from '../people'
import { groupsOf, putGroups } from '../problem-groups'
import { uploadProblem } from '../problem-upload'
import { editProblem } from '../problems'
import { programmeBench, requireProgrammed } from '../programming'
import { startReference } from '../reference-start'
import { uploadReturn } from '../returns'
import { asStoredFile } from '../stored-files'
import { handOver } from '../review'
import { benchOf, createRunSheet, runSheetRow } from '../run-sheets'
import { deleteWorkspaceForGood } from '../workspace-deletion'
import type { DemoFile } from './problems'
import { DEMO_FILES } from './problems'

const FACT = 'demo workspace'

type Cast = Record<'owner' | 'developer' | 'steward' | 'reviewer' | 'reader', Actor>

/**
 * Fills an empty database with the invented ferry operator. Interrupted seeding is begun again at the next start; a
 * database that holds anything else is left alone.
 */
export async function seedDemo(app: App, passwords: Passwords): Promise<void> {
  const earlier = await readFact(app.db, FACT)
  if (earlier === 'seeded') return noteSeeded(app)
  await takeFact(app.db, SEEDED_AT)
  if (earlier) await app.db.transaction((tx) => deleteWorkspaceForGood(app, tx, earlier))
  else if (await anyUser(app.db)) return
  const cast = await seedPeople(app, passwords)
  await seedWork(app, cast)
  await setFact(app.db, FACT, 'seeded')
  await noteSeeded(app)
}

/** What is made from now on is made by people. */
async function noteSeeded(app: App): Promise<void> {
  await keepFact(app.db, SEEDED_AT, app.now().toISOString())
}

async function seedPeople(app: App, passwords: Passwords): Promise<Cast> {
  const passwordHash = await passwords.hash(DEMO_PASSWORD)
  return app.db.transaction(async (tx) => {
    const workspaceId = await createWorkspace(app, tx, 'Brackwater Ferries')
    await keepFact(tx, FACT, workspaceId)
    const cast: Partial<Cast> = {}
    for (const account of DEMO_ACCOUNTS) {
      const userId = await createAccount(app, tx, { ...account, passwordHash, workspaceId })
      cast[account.email.split('@')[0] as keyof Cast] = { userId, workspaceId }
    }
    return cast as Cast
  })
}

/** About one qubit in fifty and a few couplers missing, drawn once. */
function demoDefects({ ids, graph }: Fabric, seed: number): { qubits: number[]; couplers: [number, number][] } {
  const random = createRandom(seed)
  const qubits = [...new Set(Array.from({ length: Math.round(ids.length / 50) }, () => ids[random.below(ids.length)]!))]
  const couplers = Array.from({ length: 6 }, (): [number, number] => {
    const edge = random.below(graph.ends.length / 2)
    return [ids[graph.ends[2 * edge]!]!, ids[graph.ends[2 * edge + 1]!]!]
  })
  return { qubits, couplers }
}

/** Invented energies in GHz: A falls exponentially to nothing, B rises as a power of s. */
function demoEnergies(most: { A: number; B: number }) {
  const rounded = (value: number) => Number(value.toFixed(4))
  const steepness = 7
  const tail = Math.exp(-steepness)
  const s = Array.from({ length: 51 }, (_, k) => k / 50)
  return {
    s,
    A: s.map((at) => rounded((most.A * (Math.exp(-steepness * at) - tail)) / (1 - tail))),
    B: s.map((at) => rounded(most.B * at ** 1.6)),
  }
}

async function seedMachines(app: App, steward: Actor): Promise<{ alder: string; juniper: string }> {
  const ranges = { h: [-4, 4], J: [-2, 1], couplingSum: [-18, 15] }
  const timing = {
    programmingMicroseconds: 14_200,
    readoutMicroseconds: 123,
    delayMicroseconds: 21,
    annealMinMicroseconds: 0.5,
    annealMaxMicroseconds: 2000,
    slopeMaxPerMicrosecond: 2,
    schedulePointsMax: 12,
  }
  const create = async (
    name: string,
    note: string,
    family: PublishedFamily,
    seed: number,
    most: { A: number; B: number },
  ) =>
    createMachine(
      app,
      steward,
      createMachineSchema.parse({
        name,
        note,
        family,
        defects: demoDefects(await fabricOf(app, family), seed),
        ranges,
        timing,
        controlError: { h: 0.021, J: 0.015 },
        temperatureMillikelvin: 13.1,
        energyTable: demoEnergies(most),
        price: { perSecond: 0.75, currency: 'EUR' },
      }),
    )
  const note = 'Machine of the laboratory at Holm Point, bought by the second. Figures are what the steward entered.'
  const alder = await create('Alder', note, { kind: 'pegasus', m: 6, trimmed: true }, 11, { A: 9.2, B: 11.8 })
  await calibrateMachine(app, steward, alder.id, {
    controlError: { h: 0.02, J: 0.015 },
    energyTable: demoEnergies({ A: 9.05, B: 11.9 }),
    remark: 'The laboratory swapped an amplifier on the left edge.',
  })
  const juniper = await create('Juniper', note, { kind: 'zephyr', m: 4, t: 4 }, 12, { A: 8.4, B: 12.6 })
  await saveBridge(app, steward, juniper.id, { kind: 'rehearsal', url: null, isOn: true })
  return { alder: alder.id, juniper: juniper.id }
}

async function seedProblem(app: App, developer: Actor, file: DemoFile): Promise<string> {
  const { id } = await uploadProblem(
    app,
    developer,
    { name: file.fileName, bytes: Buffer.from(file.text) },
    uploadProblemSchema.parse({ name: file.name }),
  )
  await editProblem(app, developer, id!, { note: file.note })
  return id!
}

/** Runs a search through the queue, as a person would, and waits for it. */
async function seedEmbedding(
  app: App,
  developer: Actor,
  problemId: string,
  machineId: string,
  seed: number,
): Promise<string> {
  const search = createEmbeddingSchema.parse({ problemId, machineId, seed, tries: 4, timeLimitSeconds: 20 })
  const { id, jobId } = await startEmbedding(app, developer, search)
  await finished(app, jobId)
  return id
}

async function finished(app: App, jobId: string): Promise<void> {
  for (;;) {
    const job = await findJob(app.db, jobId)
    if (job?.status === 'done') return
    if (!job || job.status === 'failed' || job.status === 'cancelled')
      throw new Error(`work for the demo ended as ${job?.status}: ${job?.message}`)
    await new Promise((resolve) => setTimeout(resolve, 100))
  }
}

/** Confirms the constraint groups as they are recognised, and looks for the reference optimum. */
async function seedUnderstanding(app: App, developer: Actor, problemId: string): Promise<void> {
  const { recognised, problemVersion } = await groupsOf(app, developer, problemId)
  const groups = recognised.map(({ name, kind, k, members, source }) => ({ name, kind, k, members, source }))
  await putGroups(app, developer, problemId, saveGroupsSchema.parse({ groups, version: problemVersion }))
  const { jobId } = await startReference(app, developer, problemId, startReferenceSchema.parse({}))
  await finished(app, jobId)
}

/** Samples as a machine with control error would give them, held by chains that are too weak. */
async function seedReturn(app: App, developer: Actor, runSheetId: string): Promise<void> {
  const sheet = await runSheetRow(app, developer, runSheetId)
  const bench = await benchOf(app, developer, sheet)
  const programmed = requireProgrammed(programmeBench(bench, sheet.settings))
  const { h: sigmaH, J: sigmaJ } = bench.machine.sheet.controlError
  const samples = await app.compute.run('rehearse', {
    programmed,
    gauge: null,
    error: { sigmaH, sigmaJ, seed: 9 },
    sweeps: 64,
    method: { model: 'simulated annealing', temperature: 0.08, arithmetic: '32-bit' },
    firstRead: 0,
    reads: sheet.settings.reads,
    seed: 4,
  })
  const csv = writeSamplesCsv(
    samples,
    Array.from(programmed.qubits, (q) => bench.machine.fabric.ids[q]!),
  )
  await asStoredFile('holm-point-0412.csv', Buffer.from(csv), (file) =>
    uploadReturn(app, developer, runSheetId, file, uploadReturnSchema.parse({ machineTimeSeconds: 0.32 })),
  )
}

async function seedWork(app: App, { developer, steward, reviewer }: Cast): Promise<void> {
  const { alder, juniper } = await seedMachines(app, steward)
  const berths = await seedProblem(app, developer, DEMO_FILES.berths)
  const channels = await seedProblem(app, developer, DEMO_FILES.channels)
  const crews = await seedProblem(app, developer, DEMO_FILES.crews)
  await seedUnderstanding(app, developer, channels)
  await grantTime(app, reviewer, { seconds: 2, machineId: alder, remark: 'Bought from Holm Point for December.' })
  await grantTime(app, reviewer, { seconds: 1, machineId: null, remark: 'For trials.' })
  const onAlder = await seedEmbedding(app, developer, channels, alder, 7)
  await seedEmbedding(app, developer, berths, alder, 3)
  const onJuniper = await seedEmbedding(app, developer, crews, juniper, 5)

  const weak = createRunSheetSchema.parse({
    embeddingId: onAlder,
    name: 'Deck radio channels, first run',
    strength: { rule: 'fixed', value: 1.25 },
    reads: 1000,
    annealMicroseconds: 72,
  })
  const returned = await createRunSheet(app, developer, weak)
  await handOver(app, developer, returned.id, 'submit', 'First run on calibration 2.')
  await handOver(app, reviewer, returned.id, 'approve', 'Within December’s time. Go ahead.')
  await handOver(app, developer, returned.id, 'issue', '')
  await seedReturn(app, developer, returned.id)

  const waiting = await createRunSheet(
    app,
    developer,
    createRunSheetSchema.parse({
      embeddingId: onJuniper,
      name: 'Two crews, first run',
      strength: { rule: 'rms' },
      reads: 400,
    }),
  )
  await handOver(app, developer, waiting.id, 'submit', 'The crew office would like the split by Friday.')
}
