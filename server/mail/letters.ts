import { groupDigits } from '../../shared/engine/digits'
import type { EmbeddingDamage } from '../../shared/schemas/machines'
import type { Role } from '../../shared/schemas/common'
import type { RunSheetState } from '../../shared/schemas/run-sheets'
import type { Letter, LetterItem, LetterPart } from './letter'
import { oneLine } from './letter'

const counted = (count: number, one: string): string => `${groupDigits(count)} ${one}${count === 1 ? '' : 's'}`

/** What of an embedding no longer holds: “2 of 40 chains damaged; missing: 3 qubits, 1 coupler”. */
export function damageWords({ chains, ofChains, qubitsLost, couplersLost }: EmbeddingDamage): string {
  const lost = [
    ...(qubitsLost.length > 0 ? [counted(qubitsLost.length, 'qubit')] : []),
    ...(couplersLost.length > 0 ? [counted(couplersLost.length, 'coupler')] : []),
  ]
  const missing = lost.length > 0 ? `; missing: ${lost.join(', ')}` : ''
  return `${groupDigits(chains)} of ${counted(ofChains, 'chain')} damaged${missing}`
}

/** An embedding that a calibration broke, for whoever made it or prepares on it. */
export interface BrokenForLetter {
  embedding: { id: string; number: number }
  problem: string
  damage: EmbeddingDamage
  runSheets: readonly { number: number; name: string; state: RunSheetState }[]
}

const brokenItem = ({ embedding, problem, damage, runSheets }: BrokenForLetter): LetterItem => ({
  text: `E-${embedding.number} of ${oneLine(problem)}`,
  path: `/embeddings/${embedding.id}`,
  under: [
    damageWords(damage),
    ...runSheets.map(({ number, name, state }) => `RS-${number} ${oneLine(name)}, ${state}, stands on it`),
  ],
})

/** A calibration broke embeddings of one person, or embeddings that run sheets of theirs stand on. */
export function brokenLetter(
  machine: { id: string; name: string; calibration: number },
  savedBy: string,
  remark: string,
  broken: readonly BrokenForLetter[],
): Letter {
  const name = oneLine(machine.name)
  const which = counted(broken.length, 'embedding')
  return {
    kind: 'embedding broken',
    subject: `Calibration ${machine.calibration} of ${name} broke ${which}`,
    parts: [
      {
        text: `${oneLine(savedBy)} saved calibration ${machine.calibration} of ${name}. ${which} of yours, or under a run sheet of yours, no longer ${broken.length === 1 ? 'holds' : 'hold'}:`,
      },
      { list: broken.map(brokenItem) },
      ...quoted(remark, 'The remark on the calibration:'),
      {
        text: 'A repair reroutes the damaged chains only. Open run sheets then move to the repaired embedding; those in review or approved go back to review.',
      },
    ],
    action: { label: `Repair on the page of ${name}`, path: `/machines/${machine.id}#broken` },
    because: 'you made the embedding or prepared a run sheet on it',
  }
}

function quoted(remark: string, before: string): LetterPart[] {
  return remark ? [{ text: before }, { quote: remark }] : []
}

export type HandedOver = 'submitted' | 'approved' | 'sent back' | 'issued'

export interface SheetForLetter {
  id: string
  number: number
  name: string
  problem: string
  machine: string
}

const STEPS: Record<HandedOver, { subject: string; sentence: string }> = {
  submitted: { subject: 'waits for review', sentence: 'submitted it for review' },
  approved: { subject: 'is approved', sentence: 'approved it' },
  'sent back': { subject: 'was sent back', sentence: 'sent it back' },
  issued: { subject: 'is issued', sentence: 'issued it: from now on it can be run' },
}

const REASONS = {
  reviewer: 'you review run sheets in this workspace',
  preparer: 'you prepared this run sheet',
  approver: 'you reviewed this run sheet',
  mentioned: 'you are named in the remark',
}
export type SheetReason = keyof typeof REASONS

/** A run sheet went one step on. */
export function handedOverLetter(
  sheet: SheetForLetter,
  step: HandedOver,
  by: string,
  remark: string,
  reason: SheetReason,
): Letter {
  const { subject, sentence } = STEPS[step]
  return {
    kind: 'run sheet handed over',
    subject: `RS-${sheet.number} ${subject}: ${oneLine(sheet.name)}`,
    parts: [
      {
        text: `RS-${sheet.number}, ${oneLine(sheet.name)}, runs ${oneLine(sheet.problem)} on ${oneLine(sheet.machine)}. ${oneLine(by)} ${sentence}.`,
      },
      ...quoted(remark, 'With the remark:'),
    ],
    action: { label: `Open RS-${sheet.number}`, path: `/run-sheets/${sheet.id}` },
    because: REASONS[reason],
  }
}

/** Somebody wrote a remark on a run sheet. */
export function remarkLetter(sheet: SheetForLetter, by: string, remark: string, reason: SheetReason): Letter {
  return {
    kind: reason === 'mentioned' ? 'mention' : 'run sheet remark',
    subject: `${oneLine(by)}${reason === 'mentioned' ? ' names you' : ''} on RS-${sheet.number}: ${oneLine(sheet.name)}`,
    parts: [
      {
        text: `${oneLine(by)} wrote on RS-${sheet.number}, ${oneLine(sheet.name)}, which runs ${oneLine(sheet.problem)} on ${oneLine(sheet.machine)}:`,
      },
      { quote: remark },
    ],
    action: { label: `Open RS-${sheet.number}`, path: `/run-sheets/${sheet.id}` },
    because: REASONS[reason],
  }
}

/** A repair moved a run sheet, which has to be reviewed again. */
export function movedLetter(sheet: SheetForLetter, moved: string, was: RunSheetState, reason: SheetReason): Letter {
  return {
    kind: 'run sheet handed over',
    subject: `RS-${sheet.number} ${was === 'approved' ? 'is back in review' : 'changed while in review'}: ${oneLine(sheet.name)}`,
    parts: [
      {
        text: `RS-${sheet.number}, ${oneLine(sheet.name)}, runs ${oneLine(sheet.problem)} on ${oneLine(sheet.machine)}. Its embedding was repaired; ${was === 'approved' ? 'it was approved, and is in review again' : 'it is still in review'}.`,
      },
      { quote: moved },
    ],
    action: { label: `Open RS-${sheet.number}`, path: `/run-sheets/${sheet.id}` },
    because: REASONS[reason],
  }
}

/** Somebody is asked into a workspace. @param path of the page behind the secret link */
export function invitationLetter(workspace: string, by: string, roles: readonly Role[], path: string): Letter {
  return {
    kind: 'invitation',
    subject: `${oneLine(by)} invites you to ${oneLine(workspace)} on Espalier`,
    parts: [
      {
        text: `${oneLine(by)} asks you into the workspace ${oneLine(workspace)}, where problems are prepared for quantum annealers. You would be: ${roles.join(', ')}.`,
      },
      {
        text: 'The link holds for seven days and can be used once. If you do not know what this is about, do nothing.',
      },
    ],
    action: { label: 'Accept the invitation', path },
    because: `${oneLine(by)} gave this address for the invitation`,
  }
}
