/** What the audit trail tells of each route that changes something, by its address. */

export const AUDIT_KINDS = [
  'problem',
  'embedding',
  'run sheet',
  'samples',
  'machine',
  'budget',
  'person',
  'invitation',
  'token',
  'workspace',
  'sign-in',
  'stand-in',
] as const
export type AuditKind = (typeof AUDIT_KINDS)[number]

export interface Deed {
  /** What was done, after the name of who did it. */
  what: string
  /** What it was done to. */
  kind: AuditKind
  /** Done to whoever did it: the address names no other thing. */
  isOwn?: true
  /** What was made keeps by whom and when itself, so that the activity of a problem and a run sheet tells it from there. */
  hasRecord?: true
}

const deed = (kind: AuditKind, what: string): Deed => ({ kind, what })
const recorded = (kind: AuditKind, what: string): Deed => ({ kind, what, hasRecord: true })
const own = (what: string): Deed => ({ kind: 'person', what, isOwn: true })

/** Also of reading, where what is read is everything. Null: the route works something out, or changes only what somebody sees of it. */
export const DEEDS: Readonly<Record<string, Deed | null>> = {
  'POST /api/account/address': own('asked for a change of their own address'),
  'DELETE /api/account/identity': own('unlinked their own account from the identity provider'),
  'POST /api/account/identity': null,
  'PUT /api/account/mails': null,
  // Written down by the service, without the address that it came from.
  'DELETE /api/account': null,
  // Written down in the workspace that was joined.
  'POST /api/account/membership': null,
  'DELETE /api/account/membership': { kind: 'workspace', what: 'left the workspace', isOwn: true },
  'POST /api/account/passkeys/challenge': null,
  'POST /api/account/passkeys': own('added a passkey of their own'),
  'DELETE /api/account/passkeys/:id': own('removed a passkey of their own'),
  'PATCH /api/account/passkeys/:id': own('renamed a passkey of their own'),
  'PUT /api/account/password': own('changed their own password'),
  'POST /api/budget/grants': deed('budget', 'granted or took back machine time'),
  'DELETE /api/embeddings/:id': deed('embedding', 'deleted'),
  'PATCH /api/embeddings/:id': deed('embedding', 'changed'),
  'POST /api/embeddings/:id/restore': deed('embedding', 'brought back'),
  'POST /api/embeddings/import': recorded('embedding', 'imported'),
  'POST /api/embeddings': recorded('embedding', 'looked for'),
  'DELETE /api/invitations/:id': deed('invitation', 'withdrew the invitation of'),
  'POST /api/invitations/:id/resend': deed('invitation', 'invited again'),
  'POST /api/invitations': deed('invitation', 'invited'),
  'DELETE /api/jobs/:id': null,
  'DELETE /api/machines/:id/bridge': deed('machine', 'removed the bridge of'),
  'PUT /api/machines/:id/bridge': deed('machine', 'set the bridge of'),
  'POST /api/machines/:id/bridge/secret': deed('machine', 'made a new bridge secret of'),
  'POST /api/machines/:id/bridge/test': null,
  'POST /api/machines/:id/calibrations': deed('machine', 'calibrated'),
  'POST /api/machines/:id/capacity': null,
  'POST /api/machines/:id/repairs': deed('machine', 'repaired embeddings on'),
  'POST /api/machines': deed('machine', 'added'),
  'POST /api/news/:id/read': null,
  'POST /api/news/read': null,
  'DELETE /api/people/:id': deed('person', 'removed'),
  'PATCH /api/people/:id': deed('person', 'changed the roles of'),
  'POST /api/people/:id/reset-link': deed('person', 'made a link for a new password of'),
  'POST /api/problems/:id/duplicate': deed('problem', 'copied'),
  'POST /api/problems/:id/energy': null,
  'PUT /api/problems/:id/groups': deed('problem', 'set the constraint groups of'),
  'DELETE /api/problems/:id': deed('problem', 'deleted'),
  'PATCH /api/problems/:id': deed('problem', 'changed'),
  'POST /api/problems/:id/labels': recorded('problem', 'renamed variables of'),
  'POST /api/problems/:id/lift': null,
  'POST /api/problems/:id/presolve': null,
  'POST /api/problems/:id/reduced': deed('problem', 'saved the pre-solved form of'),
  'POST /api/problems/:id/reference': recorded('problem', 'looked for the reference optimum of'),
  'POST /api/problems/:id/restore': deed('problem', 'brought back'),
  'POST /api/problems/:id/versions': recorded('problem', 'uploaded a version of'),
  'POST /api/problems': recorded('problem', 'uploaded'),
  'POST /api/problems/rejected': null,
  'DELETE /api/returns/:id/answer-sheet': recorded('samples', 'took back the answer link of'),
  'POST /api/returns/:id/answer-sheet': recorded('samples', 'made an answer link of'),
  'POST /api/returns/:id/next': recorded('samples', 'made the next draft from'),
  'POST /api/run-sheets/:id/approve': recorded('run sheet', 'approved'),
  'POST /api/run-sheets/:id/duplicate': recorded('run sheet', 'copied'),
  'DELETE /api/run-sheets/:id': deed('run sheet', 'deleted'),
  'PATCH /api/run-sheets/:id': deed('run sheet', 'changed'),
  'POST /api/run-sheets/:id/issue': recorded('run sheet', 'issued'),
  'POST /api/run-sheets/:id/quenches': recorded('run sheet', 'made a series of quenches from'),
  'POST /api/run-sheets/:id/rehearsals': recorded('run sheet', 'rehearsed'),
  'POST /api/run-sheets/:id/remarks': recorded('run sheet', 'wrote a remark on'),
  'POST /api/run-sheets/:id/restore': deed('run sheet', 'brought back'),
  'POST /api/run-sheets/:id/returns': recorded('run sheet', 'loaded samples of'),
  'POST /api/run-sheets/:id/scans': recorded('run sheet', 'scanned strengths of'),
  'POST /api/run-sheets/:id/send': deed('run sheet', 'sent to the bridge'),
  'POST /api/run-sheets/:id/send-back': recorded('run sheet', 'sent back'),
  'POST /api/run-sheets/:id/spins': null,
  'POST /api/run-sheets/:id/submit': recorded('run sheet', 'submitted'),
  'POST /api/run-sheets': recorded('run sheet', 'prepared'),
  'PUT /api/session/workspace': null,
  'DELETE /api/sessions/:id': own('ended a session of their own'),
  'DELETE /api/sessions': own('ended all other sessions of their own'),
  'DELETE /api/stand-ins/:id': deed('stand-in', 'took back reviews:'),
  'POST /api/stand-ins': deed('stand-in', 'handed reviews over:'),
  'DELETE /api/tokens/:id': deed('token', 'revoked the token'),
  'POST /api/tokens': deed('token', 'made the token'),
  'POST /api/workspaces': null,
  'DELETE /api/workspaces/deletion': {
    kind: 'workspace',
    what: 'took back the deletion of the workspace',
    isOwn: true,
  },
  'PUT /api/workspaces/deletion': { kind: 'workspace', what: 'asked for the deletion of the workspace', isOwn: true },
  'GET /api/workspaces/export': { kind: 'workspace', what: 'exported the workspace', isOwn: true },
  'POST /api/workspaces/import': { kind: 'workspace', what: 'sent the archive of another workspace', isOwn: true },
}

/** What the trail tells of signing in and out, which no address of a route says. */
export const SIGN_INS = {
  password: deed('sign-in', 'signed in with a password'),
  passkey: deed('sign-in', 'signed in with a passkey'),
  provider: deed('sign-in', 'signed in through the identity provider'),
  invitation: deed('sign-in', 'accepted an invitation and signed in'),
  joined: deed('sign-in', 'accepted an invitation while signed in elsewhere'),
  setup: deed('sign-in', 'set the workspace up and signed in'),
  out: deed('sign-in', 'signed out'),
  'new password': deed('sign-in', 'chose a new password by a link, which ended all sessions'),
  'wrong password': deed('sign-in', 'was refused at signing in: wrong password'),
  'wrong passkey': deed('sign-in', 'was refused at signing in: the passkey did not prove itself'),
} as const satisfies Record<string, Deed>
export type SignIn = keyof typeof SIGN_INS

/** Kind and words of what has a record of its own. */
export const RECORDED: readonly string[] = Object.values(DEEDS).flatMap((told) =>
  told?.hasRecord ? [`${told.kind} ${told.what}`] : [],
)
