import type { BridgeCallView } from '#shared/schemas/bridges'
import type { MarkKind } from '../ui/parts'
import { formatCount } from '../format'
import { formatDateTime } from '../formatTime'

/** Where a run sheet stands on its way to the bridge and back, in a word and a sentence. */
export interface CallStanding {
  mark: MarkKind
  word: string
  sentence: string
}

const lastReason = ({ tries }: BridgeCallView): string => tries[0]?.reason ?? ''
const at = (moment: string | null | undefined): string => (moment ? formatDateTime(moment) : '')

/** @param call what the server says of it */
export function callStanding(call: BridgeCallView): CallStanding {
  const tried = formatCount(call.tries.length, 'try', 'tries')
  switch (call.state) {
    case 'waiting':
      return call.tries.length === 0
        ? { mark: 'computed', word: 'waiting', sentence: 'On its way to the bridge.' }
        : {
            mark: 'caution',
            word: 'trying again',
            sentence: `${tried} so far. The last failed: ${lastReason(call)}. The next is at ${at(call.nextAttemptAt)}.`,
          }
    case 'taken':
      return {
        mark: 'passed',
        word: 'taken',
        sentence: `The bridge took it at ${at(call.tries[0]?.at)}. Its samples are awaited until ${at(call.tokenExpiresAt)}.`,
      }
    case 'given up':
      return { mark: 'refused', word: 'given up', sentence: `Not taken after ${tried}: ${lastReason(call)}.` }
    case 'refused':
      return { mark: 'refused', word: 'refused', sentence: `The bridge says: “${call.refusal}”` }
    case 'returned':
      return call.kind === 'rehearsal'
        ? {
            mark: 'passed',
            word: 'rehearsed',
            sentence: 'The built-in bridge sent a rehearsal back. The machine has not run it.',
          }
        : { mark: 'passed', word: 'samples back', sentence: 'The bridge sent the samples back.' }
    case 'ended':
      return { mark: 'computed', word: 'ended', sentence: 'Samples were loaded by hand, which ended the call.' }
  }
}

/** Something may still happen without anybody doing anything here. */
export const isUnderWay = (call: BridgeCallView | null): boolean => call?.state === 'waiting' || call?.state === 'taken'
