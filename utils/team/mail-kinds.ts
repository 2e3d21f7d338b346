import type { ChosenMailKind } from '#shared/schemas/mail'

/** What each kind of message tells, for whoever chooses. */
export const MAIL_KIND_WORDS: Record<ChosenMailKind, { label: string; hint: string }> = {
  'run sheet handed over': {
    label: 'Run sheets handed over',
    hint: 'One that waits for your review; one of yours that was approved, sent back, issued, or went back to review; reviews of somebody away that are in your hands.',
  },
  'run sheet remark': { label: 'Remarks', hint: 'On run sheets that you prepared or review.' },
  mention: { label: 'Mentions', hint: 'Remarks in which somebody names you, on whatever run sheet.' },
  bridge: {
    label: 'Bridges',
    hint: 'A run sheet that you sent to one: its samples came back, it was refused, or it was not taken.',
  },
  'embedding broken': {
    label: 'Embeddings broken by a calibration',
    hint: 'One that you made, or that a run sheet of yours stands on.',
  },
}
