import type { Letter } from './letter'
import { oneLine } from './letter'

const dayOf = (at: Date): string =>
  at.toLocaleDateString('en-GB', { day: 'numeric', month: 'long', year: 'numeric', timeZone: 'UTC' })

/** To every member of a workspace whose deletion was asked for. */
export const deletionAskedLetter = (workspace: string, by: string, deletesAt: Date): Letter => ({
  kind: 'workspace deletion',
  subject: `${oneLine(workspace)} is to be deleted on ${dayOf(deletesAt)}`,
  parts: [
    {
      text: `${oneLine(by)} asked for the deletion of ${oneLine(workspace)}. It goes on as before until ${dayOf(deletesAt)}; then everything in it is deleted for good, and the accounts that belong to no other workspace with it.`,
    },
    { text: 'Until then any owner can export it as a file, or keep it after all.' },
  ],
  action: { label: `Open ${oneLine(workspace)}`, path: '/people/workspace' },
  because: 'you belong to this workspace',
})

/** To every member of a workspace that stays after all. */
export const deletionTakenBackLetter = (workspace: string, by: string): Letter => ({
  kind: 'workspace deletion',
  subject: `${oneLine(workspace)} stays`,
  parts: [{ text: `${oneLine(by)} took back the deletion of ${oneLine(workspace)}. Nothing was deleted.` }],
  action: { label: `Open ${oneLine(workspace)}`, path: '/' },
  because: 'you belong to this workspace',
})
