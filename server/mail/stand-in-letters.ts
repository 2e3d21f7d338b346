import type { Letter } from './letter'
import { oneLine } from './letter'

const open = { label: 'Open what waits for review', path: '/run-sheets/review' }

/** A reviewer who will be away hands their reviews over. @param startsOn first day, UTC @param endsOn last day, UTC */
export const standInLetter = (name: string, startsOn: string, endsOn: string): Letter => ({
  kind: 'run sheet handed over',
  subject: `You review for ${oneLine(name)} from ${startsOn} to ${endsOn}`,
  parts: [
    {
      text: `${oneLine(name)} is away. From ${startsOn} to ${endsOn}, days of UTC, you approve run sheets or send them back in their place. Nobody decides on a run sheet that they prepared themselves; nor can you on one that ${oneLine(name)} prepared.`,
    },
  ],
  action: open,
  because: `the reviews of ${oneLine(name)} were handed over to you`,
})

/** Reviews that were handed over are taken back before their time. */
export const standInEndedLetter = (name: string): Letter => ({
  kind: 'run sheet handed over',
  subject: `You no longer review for ${oneLine(name)}`,
  parts: [{ text: `The reviews of ${oneLine(name)} are no longer in your hands.` }],
  action: open,
  because: `the reviews of ${oneLine(name)} had been handed over to you`,
})
