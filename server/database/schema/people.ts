import { sql } from 'drizzle-orm'
import { bigint, boolean, index, integer, jsonb, pgTable, primaryKey, text, uniqueIndex } from 'drizzle-orm/pg-core'
import type { Role } from '../../../shared/schemas/common'
import type { ChosenMailKind } from '../../../shared/schemas/mail'
import { createdAt, id, moment } from './columns'

export const users = pgTable(
  'users',
  {
    id: id(),
    /** Lower case. Null without an account: known from the archive of a workspace only, or removed. */
    email: text(),
    name: text().notNull(),
    /** Null for somebody who signs in by passkey or through an identity provider only. */
    passwordHash: text(),
    createdAt: createdAt(),
  },
  (table) => [uniqueIndex().on(table.email)],
)

/** The address of somebody who can only be a person with an account: a member, whoever a link was sent to. */
export const accountEmail = sql<string>`${users.email}`

export const workspaces = pgTable('workspaces', {
  id: id(),
  name: text().notNull(),
  createdAt: createdAt(),
  /** When it is deleted for good; null while nobody asked for that. */
  deletesAt: moment(),
})

/** People that the archive of a workspace told of: they have no account until an invitation finds them by their address. */
export const archivedPeople = pgTable(
  'archived_people',
  {
    userId: text()
      .primaryKey()
      .references(() => users.id, { onDelete: 'cascade' }),
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    /** Lower case; null for somebody who had no account there either. */
    email: text(),
    /** Of a member at the time; empty for others. */
    roles: text().array().$type<Role[]>().notNull(),
  },
  (table) => [index().on(table.workspaceId, table.email)],
)

export const memberships = pgTable(
  'memberships',
  {
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    roles: text().array().$type<Role[]>().notNull(),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.workspaceId, table.userId] })],
)

/** Facts about this installation, such as the one-time code that opens the first account. */
export const installation = pgTable('installation', { key: text().primaryKey(), value: text().notNull() })

/** Where somebody is signed in; the sealed cookie names the row, and without it is worth nothing. */
export const sessions = pgTable(
  'sessions',
  {
    id: id(),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** The workspace that this session is looking at. */
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    /** What the browser said it is. */
    userAgent: text().notNull(),
    /** Address of the network that it was last seen from. */
    address: text().notNull(),
    createdAt: createdAt(),
    seenAt: moment().notNull(),
    expiresAt: moment().notNull(),
  },
  (table) => [index().on(table.userId), index().on(table.expiresAt)],
)

/** Asked into a workspace, by a link that was sent to the address. */
export const invitations = pgTable(
  'invitations',
  {
    id: id(),
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    /** Lower case. */
    email: text().notNull(),
    roles: text().array().$type<Role[]>().notNull(),
    /** SHA-256 of the secret in the link, hex. */
    tokenHash: text().notNull(),
    invitedBy: text().references(() => users.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
    expiresAt: moment().notNull(),
    acceptedBy: text().references(() => users.id, { onDelete: 'set null' }),
    acceptedAt: moment(),
    withdrawnAt: moment(),
  },
  (table) => [uniqueIndex().on(table.tokenHash), index().on(table.workspaceId)],
)

/** Links by which a person shows that an address is theirs: a new password, a change of address. */
export const confirmations = pgTable(
  'confirmations',
  {
    id: id(),
    kind: text().$type<'password' | 'address'>().notNull(),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** The address that the link was sent to. */
    email: text().notNull(),
    /** SHA-256 of the secret in the link, hex. */
    tokenHash: text().notNull(),
    createdAt: createdAt(),
    expiresAt: moment().notNull(),
    usedAt: moment(),
  },
  (table) => [uniqueIndex().on(table.tokenHash), index().on(table.userId)],
)

/** Public keys of passkeys. */
export const passkeys = pgTable(
  'passkeys',
  {
    id: id(),
    /** The authenticator's own id of it, base64url. */
    credentialId: text().notNull(),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** What the person calls it. */
    name: text().notNull(),
    /** COSE key, base64url. */
    publicKey: text().notNull(),
    /** Signatures so far, as its authenticator counts them. */
    counter: bigint({ mode: 'number' }).notNull(),
    backedUp: boolean().notNull(),
    transports: text().array().notNull(),
    createdAt: createdAt(),
    usedAt: moment(),
  },
  (table) => [uniqueIndex().on(table.credentialId), index().on(table.userId)],
)

/** What a browser has to bring an answer to, once and soon. */
export const challenges = pgTable(
  'challenges',
  {
    /** SHA-256 of the secret that the browser holds, hex. */
    tokenHash: text().primaryKey(),
    purpose: text().$type<'passkey made' | 'passkey used' | 'provider'>().notNull(),
    /** Whose answer it has to be; null where that is not known before. */
    userId: text().references(() => users.id, { onDelete: 'cascade' }),
    /** What was asked. */
    challenge: text().notNull(),
    expiresAt: moment().notNull(),
  },
  (table) => [index().on(table.expiresAt)],
)

/** Who a person is to an outside identity provider. */
export const identities = pgTable(
  'identities',
  {
    provider: text().notNull(),
    /** The provider's own id of the person. */
    subject: text().notNull(),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.provider, table.subject] }), index().on(table.userId)],
)

/** Reviewers who are away, and who reviews in their place meanwhile. */
export const standIns = pgTable(
  'stand_ins',
  {
    id: id(),
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    /** The reviewer who is away. */
    forUserId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    /** The member who reviews meanwhile. */
    byUserId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    startsAt: moment().notNull(),
    /** No longer from then on. */
    endsAt: moment().notNull(),
    madeBy: text().references(() => users.id, { onDelete: 'set null' }),
    createdAt: createdAt(),
    takenBackAt: moment(),
  },
  (table) => [index().on(table.workspaceId, table.endsAt)],
)

/** Kinds of messages that a person does not want from a workspace. */
export const unwantedMails = pgTable(
  'unwanted_mails',
  {
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    kind: text().$type<ChosenMailKind>().notNull(),
  },
  (table) => [primaryKey({ columns: [table.userId, table.workspaceId, table.kind] })],
)

/** Attempts that are counted so that nobody makes too many, by what they were made at. */
export const attempts = pgTable(
  'attempts',
  {
    /** For example `sign-in owner@example.org`. */
    key: text().primaryKey(),
    count: integer().notNull(),
    /** From when on counting begins anew. */
    resetsAt: moment().notNull(),
  },
  (table) => [index().on(table.resetsAt)],
)

/** What scripts sign in with. */
export const tokens = pgTable(
  'tokens',
  {
    id: id(),
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    name: text().notNull(),
    role: text().$type<Role>().notNull(),
    /** SHA-256 of the token, hex: it is shown once. */
    tokenHash: text().notNull(),
    createdAt: createdAt(),
    expiresAt: moment(),
    usedAt: moment(),
  },
  (table) => [uniqueIndex().on(table.tokenHash), index().on(table.workspaceId)],
)

/** Requests that were answered under a key of the caller's: asked again, they get the same answer and do nothing twice. */
export const answeredRequests = pgTable(
  'answered_requests',
  {
    workspaceId: text()
      .notNull()
      .references(() => workspaces.id, { onDelete: 'cascade' }),
    userId: text()
      .notNull()
      .references(() => users.id, { onDelete: 'cascade' }),
    key: text().notNull(),
    /** Method, address, and SHA-256 of the body: the same key with another request is a mistake. */
    request: text().notNull(),
    /** Null while it is being answered. */
    status: integer(),
    answer: jsonb(),
    createdAt: createdAt(),
  },
  (table) => [primaryKey({ columns: [table.workspaceId, table.userId, table.key] }), index().on(table.createdAt)],
)
