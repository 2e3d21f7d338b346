import type { EditRunSheet, RunSheetSettings, RunSheetView, Strength } from '#shared/schemas/run-sheets'
import { editRunSheetSchema } from '#shared/schemas/run-sheets'

/** A number as a form holds it: null when empty, NaN when it cannot be read. */
export type Typed = number | null

export interface StrengthDraft {
  rule: Strength['rule']
  /** Null: the rule's own value. */
  value: Typed
  perChain: Record<string, number>
}

/** The settings as the form shows them, with what was typed even where it cannot be saved. */
export interface RunSheetDraft extends Pick<
  RunSheetSettings,
  'fieldSplit' | 'interactionCouplers' | 'chainCouplers' | 'schedule'
> {
  name: string
  strength: StrengthDraft
  gauges: Typed
  reads: Typed
  annealMicroseconds: Typed
  /** Null: as large as fits. */
  scale: Typed
  seed: Typed
}
export type DraftField = keyof RunSheetDraft

export const DRAFT_FIELDS: readonly DraftField[] = [
  'name',
  'strength',
  'fieldSplit',
  'interactionCouplers',
  'chainCouplers',
  'gauges',
  'reads',
  'annealMicroseconds',
  'schedule',
  'scale',
  'seed',
]

/** What a run sheet holds of one field, in the shape of the form. */
export function draftOf(sheet: RunSheetView): RunSheetDraft {
  const { strength, ...settings } = sheet.settings
  return {
    ...settings,
    name: sheet.name,
    strength: { rule: strength.rule, value: strength.value ?? null, perChain: { ...strength.perChain } },
  }
}

const COMPLAINTS: Record<DraftField, string> = {
  name: 'Give a name of at most 120 characters.',
  strength: 'Give a number above 0 and at most 1 000 000 000.',
  fieldSplit: 'Choose one of the two.',
  interactionCouplers: 'Choose one of the two.',
  chainCouplers: 'Choose one of the two.',
  gauges: 'Give a whole number from 1 to 1 000.',
  reads: 'Give a whole number from 1 to 100 000.',
  annealMicroseconds: 'Give a time above 0 and at most 1 000 000 µs.',
  schedule: 'Correct the points that are marked.',
  scale: 'Give a number above 0, or leave it empty.',
  seed: 'Give a whole number from 0.',
}

/** Fields that may be left empty, which says something of itself. */
const OPTIONAL: readonly DraftField[] = ['strength', 'schedule', 'scale']

function changeOf<F extends DraftField>(field: F, draft: RunSheetDraft): unknown {
  if (field !== 'strength') return draft[field]
  const { rule, value, perChain } = draft.strength
  return {
    rule,
    ...(value === null ? {} : { value }),
    ...(rule === 'manual' && Object.keys(perChain).length > 0 ? { perChain } : {}),
  }
}

/** The change to send for one field, or what is wrong with it. */
export function readField(field: DraftField, draft: RunSheetDraft): { change: EditRunSheet } | { complaint: string } {
  const result = editRunSheetSchema.safeParse({ [field]: changeOf(field, draft) })
  const empty = !OPTIONAL.includes(field) && (draft[field] === null || draft[field] === '')
  return result.success && !empty ? { change: result.data } : { complaint: COMPLAINTS[field] }
}
