import type { Role } from '#shared/schemas/common'
import type { RunSheetItem, RunSheetState } from '#shared/schemas/run-sheets'
import { formatCount } from '../format'
import { formatDuration } from '../formatTime'

/** Something that only a person with the right role can take further. */
export interface Waiting {
  sheet: RunSheetItem
  /** Begins the sentence, as in "RS-7 came back from Alder". */
  what: string
  /** Goes on with the figures. */
  rest: string
  action: string
}

interface Step {
  roles: readonly Role[]
  say: (sheet: RunSheetItem) => Omit<Waiting, 'sheet'>
}

const cost = (sheet: RunSheetItem): string =>
  `${formatCount(sheet.reads, 'read')}, about ${formatDuration(sheet.machineTimeMilliseconds / 1000)} of machine time`

const STEPS: Partial<Record<RunSheetState, Step>> = {
  'in review': {
    roles: ['reviewer'],
    say: (sheet) => ({
      what: `RS-${sheet.number} waits for review`,
      rest: `on ${sheet.machine.name}: ${cost(sheet)} (an estimate).`,
      action: 'Review',
    }),
  },
  returned: {
    roles: ['developer', 'owner'],
    say: (sheet) => ({
      what: `RS-${sheet.number} came back from ${sheet.machine.name}`,
      rest: `with samples of ${sheet.problem.name}.`,
      action: 'Read the samples',
    }),
  },
  approved: {
    roles: ['developer', 'owner'],
    say: (sheet) => ({
      what: `RS-${sheet.number} was approved`,
      rest: `and can be issued to ${sheet.machine.name}: ${cost(sheet)} (an estimate).`,
      action: 'Issue',
    }),
  },
  'sent back': {
    roles: ['developer', 'owner'],
    say: (sheet) => ({
      what: `RS-${sheet.number} was sent back`,
      rest: `with a remark on ${sheet.name}.`,
      action: 'Read the remark',
    }),
  },
}

/** Run sheets that wait for a person with these roles, newest change first. */
export function waitingFor(sheets: readonly RunSheetItem[], roles: readonly Role[]): Waiting[] {
  return sheets
    .flatMap((sheet) => {
      const step = STEPS[sheet.state]
      return step?.roles.some((role) => roles.includes(role)) ? [{ sheet, ...step.say(sheet) }] : []
    })
    .sort((a, b) => (a.sheet.changedAt < b.sheet.changedAt ? 1 : -1))
}
