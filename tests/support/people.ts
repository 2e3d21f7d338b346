import type { Actor, App } from '../../server/app'
import type { Passwords } from '../../server/services/people'
import { createAccount } from '../../server/services/people'
import type { Role } from '../../shared/schemas/common'

/** Hashing that takes no time. */
export const plainPasswords: Passwords = {
  hash: async (password) => `hash of ${password}`,
  verify: async (hash, password) => hash === `hash of ${password}`,
}

/** Another member of a workspace, whose address is their name. */
export async function newMember(
  app: App,
  { workspaceId }: Actor,
  name: string,
  roles: Role[],
  passwordHash = '-',
): Promise<Actor> {
  const email = `${name.toLowerCase()}@works.example.org`
  const userId = await app.db.transaction((tx) =>
    createAccount(app, tx, { name, email, passwordHash, workspaceId, roles }),
  )
  return { userId, workspaceId }
}
