import type { Letter } from './letter'
import { oneLine } from './letter'
import type { SheetForLetter } from './letters'

/** What came of a run sheet that was sent to a bridge. */
export interface CallTold {
  what: 'given up' | 'refused' | 'rehearsed' | 'returned'
  /** Why it failed, or what the bridge said. */
  said: string | null
}

const WORDS: Record<CallTold['what'], { subject: string; sentence: string }> = {
  'given up': {
    subject: 'was not taken by the bridge',
    sentence: 'could not be handed to the bridge of the machine, and is not tried any more. It can be sent again.',
  },
  refused: { subject: 'was refused by the bridge', sentence: 'was refused by the bridge of the machine.' },
  rehearsed: {
    subject: 'has a rehearsal back',
    sentence: 'went to the built-in bridge, which rehearsed it. The machine has not run it.',
  },
  returned: { subject: 'has samples back', sentence: 'was run by the bridge of the machine; its samples are here.' },
}

const REASONS = { owner: 'you own this workspace', sender: 'you sent this run sheet to the bridge' }

/** What came of a run sheet that was sent to the bridge of its machine. */
export function bridgeLetter(
  { id, number, name, problem, machine }: SheetForLetter,
  { what, said }: CallTold,
  reason: keyof typeof REASONS,
): Letter {
  const { subject, sentence } = WORDS[what]
  return {
    kind: 'bridge',
    subject: `RS-${number} ${subject}: ${oneLine(name)}`,
    parts: [
      {
        text: `RS-${number}, ${oneLine(name)}, which runs ${oneLine(problem)} on ${oneLine(machine)}, ${sentence}`,
      },
      ...(said === null ? [] : [{ quote: said }]),
    ],
    action: { label: `Open RS-${number}`, path: `/run-sheets/${id}#bridge` },
    because: REASONS[reason],
  }
}
