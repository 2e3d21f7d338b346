import { groupDigits, THIN_SPACE } from '../../../shared/engine/digits'
import type { Optimum } from '../../../shared/engine/problem/optimum/outcome'
import { assembleOptimum } from '../../../shared/engine/problem/optimum/outcome'
import type { OptimumPlan } from '../../../shared/engine/problem/optimum/plan'
import { optimumMethodSchema } from '../../../shared/schemas/reference'
import type { App } from '../../app'
import { findReferredProblem } from '../../database/repositories/problems'
import type { ReferenceRow } from '../../database/repositories/reference-optima'
import { findReferenceOfJob, updateReference } from '../../database/repositories/reference-optima'
import { problemData } from '../../services/problems'
import type { ReferenceDetail } from '../../services/reference-view'
import { upIn } from '../../services/reference-view'
import { signed, signOf } from '../../services/sense'
import type { JobContext, JobKindHandler, JobOutcome } from '../kind'
import { methodWords, partsOf } from '../optimum/parts'
import type { SolvedPart } from '../optimum/solve-parts'
import { solveParts } from '../optimum/solve-parts'
import { Standing } from '../optimum/standing'

/** Thrown while saving, it also takes back the adoption of what was written. */
const DELETED = 'the problem was deleted meanwhile'

/** Looks for the best possible value of a problem, component by component, and stores the best that was found. */
export const referenceJob: JobKindHandler = {
  async run(app, context) {
    const row = await findReferenceOfJob(app.db, context.job.subjectId)
    if (!row) throw new Error(DELETED)
    return look(app, context, row)
  },
  async abandon(tx, job, status, reason) {
    await updateReference(tx, job.subjectId, { status, reason })
  },
}

async function subjectOf(app: App, row: ReferenceRow) {
  const problemRow = await findReferredProblem(app.db, row.problemId, row.problemVersion)
  if (!problemRow) throw new Error(DELETED)
  return { ...(await problemData(app, problemRow)), sense: problemRow.sense }
}

type Subject = Awaited<ReturnType<typeof subjectOf>>

async function look(app: App, context: JobContext, row: ReferenceRow): Promise<JobOutcome> {
  const subject = await subjectOf(app, row)
  const { problem, form } = subject
  const limitSeconds = Number(row.settings.timeLimitSeconds)
  const started = performance.now()
  const asked = optimumMethodSchema.safeParse(row.settings.method)
  const planned = await app.compute.run('planOptimum', { problem, form, method: asked.success ? asked.data : null })
  if (planned.refusal !== null) throw new Error(planned.refusal)
  const { plan } = planned
  const standing = new Standing(subject, plan, limitSeconds)
  const solved = await solveParts(app.compute, {
    plan,
    seed: Number(row.settings.seed),
    limitSeconds,
    standing,
    signal: context.signal,
    tell: (seconds) => context.report(standing.fraction(seconds), standing.message, { ...standing.progress }),
  })
  const seconds = (performance.now() - started) / 1000
  const optimum = assembleOptimum(problem, form, plan, solved)
  return found(app, context, { row, subject, plan, solved, optimum, seconds })
}

interface Found {
  row: ReferenceRow
  subject: Subject
  plan: OptimumPlan
  solved: readonly SolvedPart[]
  optimum: Optimum
  seconds: number
}

function detailOf({ subject, plan, solved, optimum }: Found): ReferenceDetail {
  const counted = solved.every(({ optima }) => optima !== null)
  // An isolated variable without a coefficient may be either.
  const free = plan.isolated.reduce((count, v) => count + (subject.problem.linear[v] === 0 ? 1 : 0), 0)
  return {
    parts: partsOf(plan, solved),
    isolated: plan.isolated.length,
    tolerance: optimum.tolerance,
    optima: counted ? solved.reduce((product, { optima }) => product * optima!, 2 ** free) : null,
    up: upIn(subject.labels, optimum.state),
  }
}

/** Why it is not proved; null when it is. */
function unprovedReason({ optimum, row, solved, plan }: Found, cancelled: boolean): string | null {
  if (optimum.proved) return null
  if (cancelled) return 'Stopped before it was proved; the best so far is kept.'
  const open = solved.flatMap((outcome, p) => (outcome.proved ? [] : [plan.parts[p]!.method]))
  if (open.every((method) => method === 'annealing')) return 'Annealing proves nothing.'
  return `Not proved within the time limit of ${row.settings.timeLimitSeconds}${THIN_SPACE}s; the best so far is kept.`
}

async function found(app: App, { signal }: JobContext, given: Found): Promise<JobOutcome> {
  const { row, subject, plan, solved, optimum, seconds } = given
  const reason = unprovedReason(given, signal.aborted)
  const stateBlobId = await app.blobs.write(optimum.state)
  const energy = signed(signOf(subject.sense), optimum.energy)
  const method = methodWords(plan, solved)
  return {
    status: 'done',
    message: `${optimum.proved ? 'proved' : 'best found'}: ${groupDigits(energy)}, by ${method}`,
    async save(tx) {
      await app.blobs.adopt(tx, stateBlobId)
      const kept = await updateReference(tx, row.id, {
        status: 'found',
        energy: optimum.energy,
        bound: optimum.bound,
        proved: optimum.proved,
        stateBlobId,
        method,
        detail: { ...detailOf(given) },
        seconds,
        reason,
      })
      if (!kept) throw new Error(DELETED)
    },
  }
}
