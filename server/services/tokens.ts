import { randomUUID } from 'node:crypto'
import { DomainError } from '../../shared/errors'
import type { Page, PageQuery, Role } from '../../shared/schemas/common'
import type { CreateToken, MadeToken, TokenStanding, TokenView } from '../../shared/schemas/tokens'
import type { Actor, App } from '../app'
import { pageOf, positionOf } from '../database/repositories/pages'
import type { TokenRow } from '../database/repositories/tokens'
import {
  countTokens,
  deleteToken,
  findTokenByHash,
  insertToken,
  listTokens,
  noteTokenUse,
} from '../database/repositories/tokens'
import { rolesIn } from './people'
import { newSecret, secretHash } from './secrets'

/** Tells what it is to whoever finds one, and to programs that look for secrets in files. */
const PREFIX = 'espalier_'
const MOST_TOKENS = 50
/** Its last use is written down no more often than this. */
const USE_NOTED_MS = 60_000

/** Somebody with the roles they hold. */
interface Holder extends Actor {
  roles: readonly Role[]
}

/** Who a request with a token is from. */
export interface TokenCaller extends Actor {
  tokenId: string
  /** The one role of the token. */
  roles: readonly [Role]
}

/**
 * Makes a token for one's own scripts. It is kept as its hash alone.
 * @throws DomainError for a role that its maker does not hold, a time that has passed, or too many tokens
 */
export async function createToken(app: App, { roles, ...actor }: Holder, input: CreateToken): Promise<MadeToken> {
  if (!roles.includes(input.role))
    throw new DomainError(
      'forbidden',
      'token.role',
      `You do not hold the role ${input.role}, so no token of yours can. You hold ${roles.join(', ')}.`,
    )
  const expiresAt = input.expiresAt === null ? null : new Date(input.expiresAt)
  if (expiresAt && expiresAt <= app.now())
    throw new DomainError('not acceptable', 'token.expiry', 'This time has passed already.', [
      { path: 'expiresAt', message: 'this time has passed already' },
    ])
  if ((await countTokens(app.db, actor)) >= MOST_TOKENS)
    throw new DomainError(
      'wrong state',
      'token.many',
      `You have ${MOST_TOKENS} tokens, which is as many as one person may have. Revoke one that is used no more.`,
    )
  const { secret: token, tokenHash } = newSecret(PREFIX)
  const id = randomUUID()
  const { name, role } = input
  await insertToken(app.db, {
    ...{ id, workspaceId: actor.workspaceId, userId: actor.userId, name, role, expiresAt },
    tokenHash,
    createdAt: app.now(),
    usedAt: null,
  })
  return { id, token }
}

/** Owners see everybody's tokens of the workspace, others their own. */
const scopeOf = ({ roles, workspaceId, userId }: Holder) =>
  roles.includes('owner') ? { workspaceId } : { workspaceId, userId }

/** Tokens, newest first: one's own, and for owners those of the whole workspace. */
export async function tokensOf(app: App, holder: Holder, { limit, cursor }: PageQuery): Promise<Page<TokenView>> {
  const offset = positionOf(cursor)
  const rows = await listTokens(app.db, scopeOf(holder), { limit: limit + 1, offset })
  const views = rows.map(({ token, by, roles }) => viewOf(token, by, standingOf(token, roles ?? [], app.now())))
  return pageOf(views, limit, offset)
}

/** Ends a token at once: one's own, or for owners anybody's of the workspace. */
export async function revokeToken(app: App, holder: Holder, id: string): Promise<void> {
  if (!(await deleteToken(app.db, scopeOf(holder), id)))
    throw new DomainError('not found', 'token.missing', 'There is no such token.')
}

const REFUSED: Record<Exclude<TokenStanding, 'valid'>, string> = {
  expired: 'This token has expired. Make a new one on the page People, Tokens.',
  'role lost': 'The person who made this token no longer holds its role here, so it opens nothing.',
}

/**
 * Who asks with a token: its maker, in its workspace, with its role alone.
 * @throws DomainError unauthenticated, for a token that is unknown, has expired, or whose maker lost the role
 */
export async function tokenCaller(app: App, token: string): Promise<TokenCaller> {
  const row = token.startsWith(PREFIX) ? await findTokenByHash(app.db, secretHash(token)) : undefined
  if (!row)
    throw new DomainError('unauthenticated', 'token.unknown', 'This is no token of this server, or it was revoked.')
  const { userId, workspaceId } = row
  const now = app.now()
  const standing = standingOf(row, (await rolesIn(app, { userId, workspaceId })) ?? [], now)
  if (standing !== 'valid')
    throw new DomainError('unauthenticated', `token.${standing.replace(' ', '-')}`, REFUSED[standing])
  if (!row.usedAt || now.getTime() - row.usedAt.getTime() >= USE_NOTED_MS) await noteTokenUse(app.db, row.id, now)
  return { userId, workspaceId, tokenId: row.id, roles: [row.role] }
}

function standingOf({ expiresAt, role }: TokenRow, held: readonly Role[], now: Date): TokenStanding {
  if (expiresAt && expiresAt <= now) return 'expired'
  return held.includes(role) ? 'valid' : 'role lost'
}

const viewOf = (row: TokenRow, by: TokenView['by'], standing: TokenStanding): TokenView => ({
  id: row.id,
  name: row.name,
  role: row.role,
  by,
  standing,
  createdAt: row.createdAt.toISOString(),
  expiresAt: row.expiresAt?.toISOString() ?? null,
  usedAt: row.usedAt?.toISOString() ?? null,
})
