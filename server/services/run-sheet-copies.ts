import { quenchAt, scheduleIssues, straightSchedule } from '../../shared/engine/programming/schedule'
import type { Schedule } from '../../shared/engine/programming/schedule'
import type { Issue } from '../../shared/errors'
import { DomainError } from '../../shared/errors'
import type { QuenchSeries } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import { embeddingRow } from './embedding-subject'
import type { Bench } from './programming'
import { loadBench, programmeBench, requireProgrammed } from './programming'
import { insertDraft, runSheetRow, timed } from './run-sheets'

const MOST_CHARACTERS = 120

/** A name with something after it, shortened where both together would be too long. */
function named(name: string, suffix: string): string {
  const room = MOST_CHARACTERS - suffix.length
  return (name.length > room ? `${name.slice(0, room - 1).toWellFormed()}…` : name) + suffix
}

/** The run sheet, and what it programmes, found to fit the machine. */
async function original(app: App, actor: Actor, id: string) {
  const row = await runSheetRow(app, actor, id)
  const bench = await loadBench(app, await embeddingRow(app, actor, row.embeddingId))
  requireProgrammed(programmeBench(bench, row.settings))
  return { row, bench }
}

/** A new draft with the settings of a run sheet in any state, on the same embedding. */
export async function duplicateRunSheet(app: App, actor: Actor, id: string): Promise<{ id: string; number: number }> {
  const { row, bench } = await original(app, actor, id)
  const copy = { bench, name: named(row.name, ', copy'), settings: row.settings, madeFromId: id }
  return app.db.transaction((tx) => insertDraft(app, tx, actor, copy))
}

/** The schedule of each point. @throws DomainError naming every point that the machine would refuse */
function quenchSchedules({ machine }: Bench, base: Schedule, { points, quenchMicroseconds }: QuenchSeries): Schedule[] {
  const { timing } = machine.sheet
  if (timing.slopeMaxPerMicrosecond === null && quenchMicroseconds === undefined)
    throw new DomainError(
      'not acceptable',
      'quenches.time',
      `${machine.machine.name} states no steepest slope. Say how long a quench may take.`,
      [{ path: 'quenchMicroseconds', message: 'missing' }],
    )
  const schedules = points.map((s) => quenchAt(base, s, quenchMicroseconds ?? (1 - s) / timing.slopeMaxPerMicrosecond!))
  const issues = schedules.flatMap((schedule, k): Issue[] =>
    scheduleIssues(schedule, timing).map(({ message }) => ({
      path: `points.${k}`,
      message: `s = ${points[k]}: ${message}`,
    })),
  )
  if (issues.length > 0)
    throw new DomainError(
      'not acceptable',
      'quenches.limits',
      `${machine.machine.name} would refuse this series: ${issues[0]!.message}.`,
      issues,
    )
  return schedules
}

/**
 * A draft for each s of a series: the schedule of the run sheet up to s, then the quench. All are made, or none.
 * @throws DomainError where the machine would refuse one of them
 */
export async function createQuenches(app: App, actor: Actor, id: string, series: QuenchSeries) {
  const { row, bench } = await original(app, actor, id)
  const { settings } = row
  const base = settings.schedule ?? straightSchedule(settings.annealMicroseconds)
  const schedules = quenchSchedules(bench, base, series)
  const items = await app.db.transaction(async (tx) => {
    const made: { id: string; number: number; s: number }[] = []
    for (const [k, s] of series.points.entries()) {
      const changed = timed({ ...settings, schedule: [...schedules[k]!] })
      const draft = { bench, name: named(row.name, `, quench at s = ${s}`), settings: changed, madeFromId: id }
      made.push({ ...(await insertDraft(app, tx, actor, draft)), s })
    }
    return made
  })
  return { items }
}
