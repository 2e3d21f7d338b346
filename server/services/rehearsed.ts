import { isDeepStrictEqual } from 'node:util'
import type { CheckView, RunSheetSettings, Strength } from '../../shared/schemas/run-sheets'
import type { ReturnRow, RunSheetRow } from '../database/repositories/run-sheets'
import { RULE_DEFAULTS } from './programming'

const filled = (strength: Strength): Strength =>
  strength.rule === 'manual' ? strength : { ...strength, value: strength.value ?? RULE_DEFAULTS[strength.rule] }

/** What samples depend on: a rehearsal has its own number of reads. */
const shaping = ({ reads: _, strength, ...settings }: RunSheetSettings) => ({ ...settings, strength: filled(strength) })

/** Whether samples were made with the settings, and on the embedding, that the run sheet has now. */
const isAsNow = ({ settings, embeddingId }: ReturnRow, row: RunSheetRow): boolean =>
  embeddingId === row.embeddingId && isDeepStrictEqual(shaping(settings), shaping(row.settings))

/** Whether the run sheet was rehearsed as it stands now. @param returned newest first */
export function rehearsalCheck(row: RunSheetRow, returned: readonly ReturnRow[]): CheckView {
  const place = { about: 'rehearsal', at: '#samples' } as const
  const rehearsals = returned.filter(({ source, status }) => source === 'rehearsal' && status === 'ready')
  const same = rehearsals.find((rehearsal) => isAsNow(rehearsal, row))
  if (same) {
    const share = Number(((100 * (same.readsWithBreak ?? 0)) / same.reads).toPrecision(2))
    const figure = `rehearsal ${same.number}: ${share} % of reads with a break`
    return { ...place, verdict: 'passed', what: 'Rehearsed with these settings', figure }
  }
  const [latest] = rehearsals
  return latest
    ? {
        ...place,
        verdict: 'caution',
        what: 'Not rehearsed with these settings',
        figure: `rehearsal ${latest.number} had others`,
      }
    : { ...place, verdict: 'caution', what: 'Not rehearsed', figure: 'breaks show before machine time is spent' }
}
