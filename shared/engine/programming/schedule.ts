/**
 * An anneal schedule: s over time as straight pieces between points, from (0, 0) to (T, 1). A flat piece is a pause; a
 * steep last piece is a quench, which reads out the populations at the s where it begins (common practice).
 */
export interface SchedulePoint {
  readonly microseconds: number
  /** 0 … 1 */
  readonly s: number
}
export type Schedule = readonly SchedulePoint[]

/** What a machine takes; null where it has no such limit. */
export interface ScheduleLimits {
  readonly annealMinMicroseconds: number
  readonly annealMaxMicroseconds: number
  readonly slopeMaxPerMicrosecond: number | null
  /** Null: the machine takes no schedule but the straight one. */
  readonly schedulePointsMax: number | null
}

export interface ScheduleIssue {
  /** The point, from 0, at which it shows. */
  readonly point: number
  readonly message: string
}

/** Times and slopes are compared with this much room for the rounding of decimal numbers. */
const ROOM = 1e-9

export const straightSchedule = (annealMicroseconds: number): Schedule => [
  { microseconds: 0, s: 0 },
  { microseconds: annealMicroseconds, s: 1 },
]

/** The whole time of a schedule. */
export const durationOf = (schedule: Schedule): number => schedule.at(-1)?.microseconds ?? 0

export const isStraight = (schedule: Schedule): boolean => schedule.length === 2

/** What is wrong with the course by itself, whatever the machine: ends, order, values. */
export function courseIssues(schedule: Schedule): ScheduleIssue[] {
  const last = schedule.length - 1
  const issues: ScheduleIssue[] = []
  schedule.forEach(({ microseconds, s }, point) => {
    const note = (message: string) => issues.push({ point, message })
    if (!Number.isFinite(microseconds) || !Number.isFinite(s)) return note('a time and an s are needed')
    if (s < 0 || s > 1) note(`s = ${s} is outside 0 to 1`)
    if (point === 0 && (microseconds !== 0 || s !== 0)) note('a schedule begins at 0 µs with s = 0')
    if (point === last && s !== 1) note('a schedule ends with s = 1')
    if (point === 0) return
    const before = schedule[point - 1]!
    if (microseconds <= before.microseconds) note(`${microseconds} µs does not come after ${before.microseconds} µs`)
    if (s < before.s) note(`s falls from ${before.s} to ${s}; it may stand still or rise`)
  })
  return issues
}

function limitIssues(schedule: Schedule, limits: ScheduleLimits): ScheduleIssue[] {
  const {
    annealMinMicroseconds: least,
    annealMaxMicroseconds: most,
    slopeMaxPerMicrosecond,
    schedulePointsMax,
  } = limits
  const last = schedule.length - 1
  const issues: ScheduleIssue[] = []
  const whole = durationOf(schedule)
  if (whole < least - ROOM || whole > most + ROOM)
    issues.push({ point: last, message: `the anneal takes ${whole} µs; the machine takes ${least} to ${most} µs` })
  if (schedulePointsMax === null && !isStraight(schedule))
    issues.push({ point: 1, message: 'the machine takes no other schedule than the straight one' })
  if (schedulePointsMax !== null && schedule.length > schedulePointsMax)
    issues.push({
      point: schedulePointsMax,
      message: `${schedule.length} points; the machine takes at most ${schedulePointsMax}`,
    })
  if (slopeMaxPerMicrosecond === null) return issues
  for (let point = 1; point <= last; point++) {
    const rise = schedule[point]!.s - schedule[point - 1]!.s
    const slope = rise / (schedule[point]!.microseconds - schedule[point - 1]!.microseconds)
    if (slope > slopeMaxPerMicrosecond * (1 + ROOM))
      issues.push({
        point,
        message: `s rises by ${Number(slope.toPrecision(4))} a µs; the machine takes at most ${slopeMaxPerMicrosecond}`,
      })
  }
  return issues
}

/**
 * Everything for which a machine would refuse a schedule, by point: it must begin at (0, 0), end at s = 1, go on in time
 * and never fall, last as long as the machine takes, have no more points and be nowhere steeper than it takes.
 */
export function scheduleIssues(schedule: Schedule, limits: ScheduleLimits): ScheduleIssue[] {
  if (schedule.length < 2) return [{ point: 0, message: 'a schedule has at least two points, (0 µs, 0) and (T, 1)' }]
  const course = courseIssues(schedule)
  return course.length > 0 ? course : limitIssues(schedule, limits)
}

/** s at a time, for a schedule without issues; 0 before it and 1 after. */
export function sAt(schedule: Schedule, microseconds: number): number {
  const next = schedule.findIndex((point) => point.microseconds > microseconds)
  if (next === 0) return 0
  if (next < 0) return 1
  const [from, to] = [schedule[next - 1]!, schedule[next]!]
  return from.s + ((microseconds - from.microseconds) / (to.microseconds - from.microseconds)) * (to.s - from.s)
}

/** The first time at which a schedule without issues reaches s. */
export function timeAt(schedule: Schedule, s: number): number {
  const next = Math.max(
    1,
    schedule.findIndex((point) => point.s >= s),
  )
  const [from, to] = [schedule[next - 1]!, schedule[next]!]
  if (to.s === from.s) return from.microseconds
  return from.microseconds + ((s - from.s) / (to.s - from.s)) * (to.microseconds - from.microseconds)
}

/** The points of a schedule up to the first time at which it reaches s, with that point itself. */
function upTo(schedule: Schedule, s: number): SchedulePoint[] {
  const at = timeAt(schedule, s)
  return [...schedule.filter((point) => point.microseconds < at), { microseconds: at, s }]
}

/**
 * The schedule with a pause where it first reaches s; everything after it comes later by as much.
 * @param s 0 < s < 1
 * @throws RangeError for an s outside or a pause that is not positive
 */
export function withPause(schedule: Schedule, s: number, microseconds: number): Schedule {
  if (!(s > 0 && s < 1)) throw new RangeError(`a pause lies between s = 0 and s = 1, not at ${s}`)
  if (!(microseconds > 0)) throw new RangeError(`a pause takes some time, not ${microseconds} µs`)
  const begun = upTo(schedule, s)
  const at = begun.at(-1)!.microseconds
  const later = schedule
    .filter((point) => point.microseconds > at)
    .map((point) => ({ microseconds: point.microseconds + microseconds, s: point.s }))
  return [...begun, { microseconds: at + microseconds, s }, ...later]
}

/**
 * The schedule up to s, and from there to 1 in the time given.
 * @param s 0 < s < 1
 * @throws RangeError for an s outside or a quench that takes no time
 */
export function withQuench(schedule: Schedule, s: number, microseconds: number): Schedule {
  if (!(s > 0 && s < 1)) throw new RangeError(`a quench begins between s = 0 and s = 1, not at ${s}`)
  if (!(microseconds > 0)) throw new RangeError(`a quench takes some time, not ${microseconds} µs`)
  const begun = upTo(schedule, s)
  return [...begun, { microseconds: begun.at(-1)!.microseconds + microseconds, s: 1 }]
}

/** Times are given to machines to the nanosecond; rounded up, no piece gets steeper than it was asked for. */
const NANOSECONDS = 1000
const roundedUp = (microseconds: number): number => Math.ceil(microseconds * NANOSECONDS - ROOM) / NANOSECONDS

/**
 * `withQuench` with times in whole nanoseconds, rounded up: one of a series that differs in s alone.
 * @param s 0 < s < 1
 * @throws RangeError for an s outside or a quench that takes no time
 */
export function quenchAt(schedule: Schedule, s: number, microseconds: number): Schedule {
  const points = withQuench(schedule, s, roundedUp(microseconds))
  const [turn, end] = [points.at(-2)!, points.at(-1)!]
  const at = roundedUp(turn.microseconds)
  const length = roundedUp(microseconds)
  return [...points.slice(0, -2), { ...turn, microseconds: at }, { ...end, microseconds: roundedUp(at + length) }]
}
