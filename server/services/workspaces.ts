import { DomainError } from '../../shared/errors'
import type { Actor, App } from '../app'
import { countWorkspacesOf, findRoles, insertMembership } from '../database/repositories/people'
import { setSessionWorkspace } from '../database/repositories/sessions'
import { countAttempt } from './attempts'
import { endConfirmations } from './confirmations'
import { createWorkspace, FOUNDER_ROLES } from './people'
import type { SessionCaller } from './sessions'

const MOST_WORKSPACES = 50
const PER_PERSON = { most: 10, withinMinutes: 60 }

/** A session as far as going from one workspace to another needs it. */
type Going = Pick<SessionCaller, 'userId' | 'sessionId'>

/**
 * Lets a session look at another workspace of its person, from the next request on.
 * @throws DomainError not found, the same for one that there is not and one that is not theirs
 */
export async function goToWorkspace(app: App, { userId, sessionId }: Going, workspaceId: string): Promise<void> {
  if (!(await findRoles(app.db, workspaceId, userId)))
    throw new DomainError('not found', 'workspace.missing', 'You belong to no such workspace, or no longer do.')
  await setSessionWorkspace(app.db, sessionId, workspaceId)
}

/** Makes a workspace that holds nothing, whose owner one is, and goes to it. @returns its id */
export async function foundWorkspace(app: App, { userId, sessionId }: Going, name: string): Promise<string> {
  await countAttempt(app, `workspaces of ${userId}`, PER_PERSON)
  return app.db.transaction(async (tx) => {
    if ((await countWorkspacesOf(tx, userId)) >= MOST_WORKSPACES)
      throw new DomainError(
        'wrong state',
        'workspace.many',
        `You belong to ${MOST_WORKSPACES} workspaces, which is as many as one person may. Leave one first.`,
      )
    const workspaceId = await createWorkspace(app, tx, name)
    await insertMembership(tx, { workspaceId, userId, roles: [...FOUNDER_ROLES], createdAt: app.now() })
    // A link for a new password may be in the hands of an owner elsewhere, who must not get in here with it.
    await endConfirmations(app, tx, userId)
    await setSessionWorkspace(tx, sessionId, workspaceId)
    return workspaceId
  })
}

/**
 * Refuses what a page asks for that shows another workspace than the session looks at.
 * @param shown id of the workspace that the page says it shows; undefined where it says none
 */
export function requireShown({ workspaceId }: Actor, shown: string | undefined): void {
  if (shown === undefined || shown === workspaceId) return
  throw new DomainError(
    'wrong state',
    'workspace.other',
    'This page is of another workspace than the one that you are in now in this browser. Nothing was done. Go back to it by its name at the top left, or load the page again.',
  )
}
