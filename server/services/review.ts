import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import { withNames } from '../../shared/mentions'
import type { Person } from '../../shared/schemas/common'
import type { RunSheetState } from '../../shared/schemas/run-sheets'
import type { Actor, App } from '../app'
import type { Db } from '../database/client'
import type { RunSheetRow } from '../database/repositories/run-sheets'
import { insertRemark, SUBMITTED, updateRunSheet } from '../database/repositories/run-sheets'
import type { HandedOver } from '../mail/letters'
import { reserveTime } from './budget'
import { mentionedMembers } from './mentions'
import { fingerprintOf, programmeBench, requireProgrammed } from './programming'
import { tellHandOver } from './run-sheet-letters'
import { benchOf, runSheetRow, runSheetView } from './run-sheets'
import { reviewingFor } from './stand-ins'

interface HandOver {
  from: readonly RunSheetState[]
  to: RunSheetState
  what: string
  told: HandedOver
}

const HAND_OVERS = {
  submit: { from: ['draft', 'sent back'], to: 'in review', what: SUBMITTED, told: 'submitted' },
  approve: { from: ['in review'], to: 'approved', what: 'approved', told: 'approved' },
  sendBack: { from: ['in review'], to: 'sent back', what: 'sent back', told: 'sent back' },
  issue: { from: ['approved'], to: 'issued', what: 'issued', told: 'issued' },
} satisfies Record<string, HandOver>

interface HandedOn {
  state: RunSheetState
  /** The reviewer who is away, in whose place it was decided; null for whoever decided as a reviewer, and for other steps. */
  for: Person | null
}

/**
 * Moves a run sheet on and tells those concerned; approval freezes and fingerprints what is programmed.
 * @param also what is done with it, in the same transaction
 */
export async function handOver(
  app: App,
  actor: Actor,
  id: string,
  step: keyof typeof HAND_OVERS,
  remark: string,
  also: (tx: Db) => Promise<void> = async () => {},
): Promise<HandedOn> {
  const { from, to, what, told }: HandOver = HAND_OVERS[step]
  const row = await runSheetRow(app, actor, id)
  if (!from.includes(row.state))
    throw new DomainError(
      'wrong state',
      'run-sheet.state',
      `RS-${row.number} is ${row.state}; it can be ${what} only from ${from.join(' or ')}.`,
    )
  if (step === 'approve' && row.preparedBy === actor.userId)
    throw new DomainError(
      'forbidden',
      'run-sheet.own',
      'Nobody approves a run sheet of their own. Ask another reviewer.',
    )
  const isReview = step === 'approve' || step === 'sendBack'
  const forWhom = isReview ? await reviewingFor(app, actor, row) : null
  const change: Partial<RunSheetRow> = { state: to, changedAt: app.now() }
  // A calibration saved since the submission may have broken the embedding.
  if (step === 'submit' || step === 'approve') await refuseBroken(app, actor, row, step)
  if (step === 'approve')
    change.fingerprint = fingerprintOf(requireProgrammed(programmeBench(await benchOf(app, actor, row), row.settings)))
  if (isReview) change.reviewedBy = actor.userId
  await app.db.transaction(async (tx) => {
    if (!(await updateRunSheet(tx, id, from, change, row.changedAt)))
      throw new DomainError(
        'wrong state',
        'run-sheet.changed',
        `RS-${row.number} was changed meanwhile. Look at it as it stands now, then decide again.`,
      )
    if (step === 'approve' || step === 'issue') await reserveTime(app, tx, row, actor.userId)
    const people = await mentionedMembers(tx, actor, remark)
    const mentions = people.map((person) => person.id)
    await insertRemark(tx, {
      id: randomUUID(),
      runSheetId: id,
      by: actor.userId,
      forUserId: forWhom?.id ?? null,
      what,
      text: remark,
      mentions,
      settings: step === 'submit' ? row.settings : null,
      createdAt: app.now(),
    })
    await also(tx)
    const said = { step: told, by: actor.userId, forWhom, remark: withNames(remark, people), mentioned: mentions }
    await tellHandOver(app, tx, { ...row, ...change }, said)
  })
  return { state: to, for: forWhom }
}

async function refuseBroken(app: App, actor: Actor, row: RunSheetRow, step: 'submit' | 'approve'): Promise<void> {
  const { checks } = await runSheetView(app, actor, row.id)
  const refused = checks.filter(({ verdict }) => verdict === 'refused')
  if (refused.length > 0)
    throw new DomainError(
      'not acceptable',
      'run-sheet.checks',
      step === 'submit'
        ? `${refused[0]!.what}. Correct this before submitting.`
        : `${refused[0]!.what}. Send the run sheet back to have this corrected.`,
      refused.map(({ what }) => ({ message: what })),
    )
}
