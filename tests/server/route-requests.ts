/** Things of a workspace that requests name, by id. */
export type Thing =
  | 'problem'
  | 'machine'
  | 'embedding'
  | 'runSheet'
  | 'return'
  | 'scan'
  | 'job'
  | 'invitation'
  | 'session'
  | 'token'
  | 'person'
  | 'workspace'
  | 'passkey'
  | 'standIn'
  | 'reviewer'
  | 'newsItem'
export type Things = Record<Thing, string>

/** A request that a route takes, `$problem` and so on standing for ids. */
export interface Sample {
  query?: string
  json?: unknown
  /** Parts of a form beside a file. */
  form?: Record<string, string>
  /** What anybody gets from a public route. */
  status?: number
  /** Its sender is in another workspace afterwards, or in none: it is not sent in earnest. */
  endsCaller?: boolean
  /** Its answer goes on for as long as somebody listens. */
  isEndless?: boolean
}

const STATES = { form: 'qubo', states: [] }
const PASSKEY = { id: 'AAAA', rawId: 'AAAA', type: 'public-key' }
const USED_PASSKEY = { ...PASSKEY, response: { clientDataJSON: '', authenticatorData: '', signature: '' } }
const MADE_PASSKEY = { ...PASSKEY, response: { clientDataJSON: '', attestationObject: '' } }
const PAIR = { problemId: '$problem', machineId: '$machine' }

/**
 * A request for every route, in an order in which they can be sent one after the other: what is deleted is brought back.
 * A route without a line here fails the test of roles.
 */
export const SAMPLES: Record<string, Sample> = {
  'GET /api/answer-sheets/{token}': { status: 404 },
  'GET /api/addresses/{secret}': { status: 404 },
  'POST /api/addresses/{secret}': { status: 404 },
  'POST /api/resets': { json: { email: 'nobody@example.org' }, status: 409 },
  'GET /api/resets/{secret}': { status: 404 },
  'POST /api/resets/{secret}': { json: { password: 'a long one, not guessed' }, status: 404 },
  'POST /api/bridge-calls/{id}/refusal': { json: { reason: 'No time.' }, status: 401 },
  'POST /api/bridge-calls/{id}/samples': { form: {}, status: 401 },
  'GET /api/entrance': { status: 200 },
  'GET /api/health': { status: 200 },
  'GET /api/invited/{secret}': { status: 404 },
  'POST /api/invited/{secret}': { json: { password: 'a long one, not guessed' }, status: 404 },
  'GET /api/openapi.json': { status: 200 },
  'GET /api/routes': { status: 200 },
  'GET /api/routes/{id}': { status: 404 },
  'GET /api/schemas/problem.json': { status: 200 },
  'GET /api/schemas/samples.json': { status: 200 },
  'DELETE /api/session': { status: 200 },
  'POST /api/passkeys/challenge': { status: 200 },
  'POST /api/session/passkey': { json: { challengeId: 'unknown', credential: USED_PASSKEY }, status: 422 },
  'GET /api/provider/callback': { status: 200 },
  'POST /api/provider': { json: {}, status: 409 },
  'POST /api/session': { json: { email: 'nobody@example.org', password: 'not one' }, status: 401 },
  'POST /api/setup': {
    json: { code: 'x', workspace: 'W', name: 'N', email: 'n@example.org', password: 'a long one, not guessed' },
    status: 403,
  },
  'GET /api/first-steps': {},
  'GET /api/session': {},
  'GET /api/people': {},
  'PATCH /api/people/{id}': { json: { roles: ['steward'] } },
  'POST /api/people/{id}/reset-link': {},
  'DELETE /api/people/{id}': {},
  'GET /api/outbox': {},
  'GET /api/audit': {},
  'GET /api/budget': {},
  'GET /api/budget/entries': {},
  'POST /api/budget/grants': { json: { seconds: 1 } },
  'GET /api/reviews': {},
  'GET /api/problems': {},
  'GET /api/problems/summary': {},
  'GET /api/problems/tags': {},
  'POST /api/problems': { form: { name: 'One more' } },
  'POST /api/problems/rejected': { form: {} },
  'GET /api/problems/{id}': {},
  'GET /api/problems/{id}/activity': {},
  'GET /api/problems/{id}/coefficients': {},
  'GET /api/problems/{id}/graph': {},
  'GET /api/problems/{id}/groups': {},
  'GET /api/problems/{id}/presolve': {},
  'GET /api/problems/{id}/reference': { query: 'version=1' },
  'GET /api/problems/{id}/references': {},
  'GET /api/problems/{id}/rejected': {},
  'GET /api/problems/{id}/removed': {},
  'GET /api/problems/{id}/returns': {},
  'GET /api/problems/{id}/sparsity': {},
  'GET /api/problems/{id}/structure': {},
  'GET /api/problems/{id}/terms': { query: 'part=linear' },
  'GET /api/problems/{id}/versions': {},
  'GET /api/problems/{id}/versions/compare': { query: 'from=1&to=1' },
  'POST /api/problems/{id}/energy': { json: STATES },
  'POST /api/problems/{id}/lift': { json: STATES },
  'POST /api/problems/{id}/presolve': { json: {} },
  'PUT /api/problems/{id}/groups': { json: { groups: [] } },
  'POST /api/problems/{id}/duplicate': { json: {} },
  'POST /api/problems/{id}/reduced': { json: {} },
  'POST /api/problems/{id}/reference': { json: {} },
  'PATCH /api/problems/{id}': { json: { name: 'Another name' } },
  'GET /api/machines': {},
  'POST /api/machines': { json: { name: 'One more', family: { kind: 'king', width: 2, height: 2 } } },
  'GET /api/machines/{id}': {},
  'GET /api/machines/{id}/breaks': {},
  'GET /api/machines/{id}/broken': {},
  'GET /api/machines/{id}/calibrations/compare': { query: 'from=1&to=1' },
  'GET /api/machines/{id}/capacity': {},
  'GET /api/machines/{id}/capacity-card': {},
  'GET /api/machines/{id}/graph': {},
  'GET /api/machines/{id}/lattice': {},
  'GET /api/machines/{id}/use': {},
  'POST /api/machines/{id}/capacity': { json: { problems: 1, timeLimitSeconds: 0.1 } },
  'POST /api/machines/{id}/repairs': { json: {} },
  'POST /api/machines/{id}/calibrations': { json: { remark: 'Nothing new.' } },
  'PUT /api/machines/{id}/bridge': { json: { kind: 'own', url: 'https://bridge.invalid/runs' } },
  'GET /api/machines/{id}/bridge': {},
  'POST /api/machines/{id}/bridge/test': {},
  'POST /api/machines/{id}/bridge/secret': {},
  'DELETE /api/machines/{id}/bridge': {},
  'POST /api/embeddings': { json: { ...PAIR, tries: 1, timeLimitSeconds: 1 } },
  'POST /api/embeddings/import': { json: { ...PAIR, chains: { a: [0] } } },
  'GET /api/embeddings/{id}': {},
  'GET /api/embeddings/{id}/chains': {},
  'PATCH /api/embeddings/{id}': { json: { chosen: true } },
  'GET /api/run-sheets': {},
  'GET /api/run-sheets/compare': { query: 'a=$runSheet&b=$runSheet' },
  'POST /api/run-sheets': { json: { embeddingId: '$embedding' } },
  'GET /api/run-sheets/{id}/activity': {},
  'GET /api/run-sheets/{id}': {},
  'GET /api/run-sheets/{id}/bundle': {},
  'GET /api/run-sheets/{id}/chains': {},
  'GET /api/run-sheets/{id}/drowned': {},
  'GET /api/run-sheets/{id}/precision': {},
  'GET /api/run-sheets/{id}/programmed': {},
  'GET /api/run-sheets/{id}/scans': {},
  'POST /api/run-sheets/{id}/spins': { json: { variables: ['no such variable'] } },
  'POST /api/run-sheets/{id}/duplicate': {},
  'POST /api/run-sheets/{id}/quenches': { json: { points: [0.5] } },
  'POST /api/run-sheets/{id}/rehearsals': { json: { reads: 10, sweeps: 10 } },
  'POST /api/run-sheets/{id}/remarks': { json: { remark: 'Seen.' } },
  'POST /api/run-sheets/{id}/returns': { form: {} },
  'POST /api/run-sheets/{id}/scans': { json: { strengths: [1, 2], reads: 10, sweeps: 10 } },
  'PATCH /api/run-sheets/{id}': { json: { reads: 100 } },
  'POST /api/run-sheets/{id}/submit': { json: { remark: 'Please.' } },
  'POST /api/run-sheets/{id}/send-back': { json: { remark: 'Not yet.' } },
  'POST /api/run-sheets/{id}/approve': { json: {} },
  'POST /api/run-sheets/{id}/issue': { json: {} },
  'POST /api/run-sheets/{id}/send': {},
  'GET /api/scans/{id}': {},
  'GET /api/returns/{id}': {},
  'GET /api/returns/{id}/analysis': {},
  'GET /api/returns/{id}/answer-sheet': {},
  'GET /api/returns/{id}/samples': {},
  'GET /api/returns/{id}/solutions': {},
  'POST /api/returns/{id}/next': { json: { items: ['raise-all'] } },
  'POST /api/returns/{id}/answer-sheet': { json: {} },
  'DELETE /api/returns/{id}/answer-sheet': {},
  'GET /api/jobs/{id}': {},
  'GET /api/jobs/{id}/events': {},
  'DELETE /api/jobs/{id}': {},
  'POST /api/problems/{id}/labels': { json: { renames: [{ from: 'no such label', to: 'b' }] } },
  'POST /api/problems/{id}/versions': { form: {} },
  'DELETE /api/run-sheets/{id}': {},
  'POST /api/run-sheets/{id}/restore': {},
  'DELETE /api/embeddings/{id}': {},
  'POST /api/embeddings/{id}/restore': {},
  'DELETE /api/problems/{id}': {},
  'POST /api/problems/{id}/restore': {},
  'GET /api/news': {},
  'GET /api/news/unread': {},
  'GET /api/news/events': { isEndless: true },
  'POST /api/news/read': { json: {} },
  'POST /api/news/{id}/read': {},
  'GET /api/invitations': {},
  'POST /api/invitations': { json: { email: 'one.more@example.org', roles: ['reader'] } },
  'POST /api/invitations/{id}/resend': {},
  'DELETE /api/invitations/{id}': {},
  'GET /api/sessions': {},
  'DELETE /api/sessions/{id}': {},
  'DELETE /api/sessions': {},
  'GET /api/account/mails': {},
  'PUT /api/account/mails': { json: { wanted: [] } },
  'POST /api/workspaces': { json: { name: 'One more' }, endsCaller: true },
  'PUT /api/session/workspace': { json: { workspaceId: '$workspace' } },
  'POST /api/account/address': { json: { email: 'other@example.org', current: 'brackwater-demo' } },
  'PUT /api/account/password': { json: { current: 'brackwater-demo', password: 'a long one, not guessed' } },
  'GET /api/account/identity': {},
  'POST /api/account/identity': { json: { current: 'brackwater-demo' } },
  'DELETE /api/account/identity': {},
  'GET /api/account/passkeys': {},
  'POST /api/account/passkeys/challenge': { json: { current: 'brackwater-demo' } },
  'POST /api/account/passkeys': { json: { name: 'Phone', challengeId: 'unknown', credential: MADE_PASSKEY } },
  'PATCH /api/account/passkeys/{id}': { json: { name: 'Old phone' } },
  'DELETE /api/account/passkeys/{id}': {},
  'POST /api/account/membership': { json: {} },
  'DELETE /api/account/membership': { endsCaller: true },
  'GET /api/stand-ins': {},
  'POST /api/stand-ins': {
    json: { byId: '$reviewer', startsOn: '2099-01-01', endsOn: '2099-01-02' },
  },
  'DELETE /api/stand-ins/{id}': {},
  'DELETE /api/account': { json: { current: 'brackwater-demo' }, endsCaller: true },
  'GET /api/people/archived': {},
  'GET /api/workspaces/current': {},
  'GET /api/workspaces/export': {},
  'POST /api/workspaces/import': { form: {} },
  'PUT /api/workspaces/deletion': { json: { name: 'Not its name' } },
  'DELETE /api/workspaces/deletion': {},
  'GET /api/tokens': {},
  'POST /api/tokens': { json: { name: 'One more', role: 'owner' } },
  'DELETE /api/tokens/{id}': {},
}

/** What the id in an address is of, by the resource before it. */
export const ID_OF: Record<string, Thing> = {
  problems: 'problem',
  machines: 'machine',
  embeddings: 'embedding',
  'run-sheets': 'runSheet',
  returns: 'return',
  scans: 'scan',
  jobs: 'job',
  invitations: 'invitation',
  sessions: 'session',
  tokens: 'token',
  people: 'person',
  passkeys: 'passkey',
  'stand-ins': 'standIn',
  news: 'newsItem',
}
