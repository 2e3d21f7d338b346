import type { ChosenMailKind, MailWishes } from '../../shared/schemas/mail'
import { CHOSEN_MAIL_KINDS } from '../../shared/schemas/mail'
import type { Actor, App } from '../app'
import { listUnwanted, replaceUnwanted } from '../database/repositories/unwanted-mails'

/** Which messages of the workspace a person gets: all that they did not say no to. */
export async function mailWishes(app: App, { workspaceId, userId }: Actor): Promise<MailWishes> {
  const unwanted = (await listUnwanted(app.db, workspaceId, [userId])).map(({ kind }) => kind)
  return { wanted: CHOSEN_MAIL_KINDS.filter((kind) => !unwanted.includes(kind)) }
}

/** Says which messages of the workspace one wants; from the next thing to tell on. */
export async function wishMails(
  app: App,
  { workspaceId, userId }: Actor,
  wanted: readonly ChosenMailKind[],
): Promise<void> {
  const unwanted = CHOSEN_MAIL_KINDS.filter((kind) => !wanted.includes(kind))
  await app.db.transaction((tx) => replaceUnwanted(tx, workspaceId, userId, unwanted))
}
