import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import prettier from 'prettier'
import type { JsonSchema } from './json-schema'
import { requestSchema } from './request-schemas'
import type { Route } from './routes'
import { readRoutes } from './routes'

const ERRORS: Record<number, string> = {
  400: 'The request cannot be read.',
  401: 'Nobody is signed in, or the token opens nothing.',
  403: 'The role is missing, or this is not for tokens.',
  404: 'There is no such thing in this workspace.',
  409: 'Not in the state that it is in.',
  413: 'More than is taken here.',
  422: 'Understood, but it cannot be accepted: the issues say what and where.',
  429: 'Too many: wait for as many seconds as `Retry-After` says.',
  503: 'A part of the server does not answer.',
}

const ERROR: JsonSchema = {
  type: 'object',
  description: 'What went wrong: `data` says it for programs and for people.',
  required: ['statusCode', 'data'],
  properties: {
    statusCode: { type: 'integer' },
    statusMessage: { type: 'string' },
    data: {
      type: 'object',
      required: ['code', 'message'],
      properties: {
        code: { type: 'string', description: 'Stable, for programs: `problem.missing`.' },
        message: { type: 'string', description: 'For people: what was wrong, where, and what to do.' },
        issues: {
          type: 'array',
          items: {
            type: 'object',
            required: ['message'],
            properties: {
              path: { type: 'string', description: 'Field of the request.' },
              line: { type: 'integer', description: 'Line of the file, from 1.' },
              message: { type: 'string' },
            },
          },
        },
      },
    },
  },
}

const IDEMPOTENCY_KEY = {
  name: 'Idempotency-Key',
  in: 'header',
  required: false,
  description: [
    'Makes it safe to ask again when an answer was lost: the same request with the same key within 24 hours gets the same',
    'answer, and nothing is done twice. 409 while the first one is being answered, 422 where the key was used for another',
    'request. What was refused is tried anew. A new random key for every request, such as a UUID.',
  ].join(' '),
  schema: { type: 'string', pattern: '^[!-~]{1,200}$' },
}

const INTRODUCTION = [
  'All that the pages do, for scripts. Sign in with a token (`Authorization: Bearer …`, made under People, Tokens), or with',
  'the session cookie of `POST /api/session`. A token acts in the name of who made it, with its one role, in its workspace;',
  'things of other workspaces answer 404. Ids are opaque. Times are ISO 8601, UTC. Units stand in the names of fields.',
  'Lists take `limit` and `cursor` and answer `{items, nextCursor}`; a `nextCursor` of null ends them.',
].join(' ')

const capital = (text: string): string => text.charAt(0).toUpperCase() + text.slice(1)

/** `/api/run-sheets/{id}/approve` by POST is `postRunSheetsByIdApprove`. */
const operationId = ({ method, path }: Route): string =>
  method +
  path
    .slice('/api/'.length)
    .replace(/\{(\w+)\}/g, 'by-$1')
    .split(/\W+/)
    .map(capital)
    .join('')

/** The first sentence, or what comes before a colon that leads on. */
function summaryOf(comment: string): string {
  const [first] = comment.split(/(?<=[^.]\.)\s|:\s|;\s/)
  return first!.replace(/\.$/, '')
}

function accessOf({ allowed, sessionOnly }: Route): string {
  if (allowed === 'anybody') return 'Anybody may ask.'
  const who = allowed === 'member' ? 'Every role.' : `Roles: ${allowed.join(', ')}.`
  return sessionOnly ? `${who} Not for tokens.` : who
}

function securityOf({ allowed, sessionOnly }: Route): Record<string, string[]>[] {
  if (allowed === 'anybody') return []
  return sessionOnly ? [{ session: [] }] : [{ token: [] }, { session: [] }]
}

function pathParameters({ path }: Route) {
  return [...path.matchAll(/([\w-]+)\/\{(\w+)\}/g)].map(([, owner, name]) => ({
    name: name!,
    in: 'path',
    required: true,
    description: name === 'id' ? `Id of the ${owner!.replace(/s$/, '').replace('-', ' ')}.` : `From \`${owner}\`.`,
    schema: { type: 'string', pattern: '^[\\w-]{1,64}$' },
  }))
}

async function queryParameters({ query }: Route) {
  if (!query) return []
  const { properties = {}, required = [] } = await requestSchema(query)
  return Object.entries(properties).map(([name, { description, ...schema }]) => ({
    name,
    in: 'query',
    required: required.includes(name),
    ...(description ? { description } : {}),
    schema,
  }))
}

async function formSchema(route: Route): Promise<JsonSchema> {
  const { properties = {}, required = [] } = await requestSchema(route.form!)
  return {
    type: 'object',
    properties: { file: { type: 'string', contentMediaType: 'application/octet-stream' }, ...properties },
    ...(route.needsFile || required.length > 0
      ? { required: [...(route.needsFile ? ['file'] : []), ...required] }
      : {}),
  }
}

async function requestBody(route: Route, components: Record<string, JsonSchema>) {
  const content: Record<string, { schema: JsonSchema }> = {}
  if (route.body) {
    const name = `${capital(route.body.name.replace(/(Request)?Schema$/, ''))}Request`
    components[name] ??= await requestSchema(route.body)
    content['application/json'] = { schema: { $ref: `#/components/schemas/${name}` } }
  }
  if (route.form) content['multipart/form-data'] = { schema: await formSchema(route) }
  return Object.keys(content).length > 0 ? { requestBody: { required: true, content } } : {}
}

const NOT_COUNTED = '/api/health'

/** Of every answer to a request that is counted. */
const RATE_HEADERS = {
  RateLimit: {
    description:
      'What is left, as in draft-ietf-httpapi-ratelimit-headers: `r` requests now, all of them again in `t` seconds.',
    schema: { type: 'string', examples: ['"caller";r=1180;t=1'] },
  },
  'RateLimit-Policy': {
    description: 'What is counted: `q` requests in `w` seconds, of the session or token (`caller`) or the `address`.',
    schema: { type: 'string', examples: ['"caller";q=1200;w=60'] },
  },
}
const RETRY_AFTER = {
  description: 'Seconds to wait (RFC 9110, section 10.2.3).',
  schema: { type: 'integer', minimum: 1 },
}
const headersNamed = (...names: string[]) =>
  Object.fromEntries(names.map((name) => [name, { $ref: `#/components/headers/${name}` }]))

const FILE: JsonSchema = { type: 'string' }

function successes(route: Route) {
  const isJsonElsewhere = route.media.some((type) => type.endsWith('+json'))
  const content = {
    ...(route.answer && !isJsonElsewhere ? { 'application/json': { schema: route.answer } } : {}),
    ...Object.fromEntries(route.media.map((type) => [type, { schema: type.endsWith('+json') ? {} : FILE }])),
  }
  const words: Record<number, string> = { 200: 'Done.', 201: 'Made.', 202: 'Begun: the job tells how far it is.' }
  return Object.fromEntries(
    route.statuses.map((status) => [
      String(status),
      {
        description: words[status] ?? ERRORS[status] ?? '',
        ...(route.path === NOT_COUNTED ? {} : { headers: headersNamed(...Object.keys(RATE_HEADERS)) }),
        ...(Object.keys(content).length > 0 ? { content } : {}),
      },
    ]),
  )
}

/** Those that its kind of route can meet, and those that its comment names. */
function errorsOf(route: Route) {
  const named = [...route.comment.matchAll(/\b4\d\d\b/g)].map(([status]) => Number(status))
  const takes = route.body ?? route.query ?? route.form
  const statuses = new Set<number>([
    ...(route.allowed === 'anybody' ? [] : [401]),
    ...(Array.isArray(route.allowed) || route.sessionOnly ? [403] : []),
    ...(route.path.includes('{') ? [404] : []),
    ...(route.body || route.form ? [400, 413] : []),
    ...(takes || route.takesKey ? [422] : []),
    ...(route.takesKey ? [409] : []),
    ...(route.path === NOT_COUNTED ? [] : [429]),
    ...named.filter((status) => ERRORS[status]),
  ])
  return Object.fromEntries(
    [...statuses].sort((a, b) => a - b).map((status) => [String(status), { $ref: `#/components/responses/${status}` }]),
  )
}

async function operation(route: Route, components: Record<string, JsonSchema>) {
  return {
    operationId: operationId(route),
    tags: [route.path.split('/')[2]!],
    summary: summaryOf(route.comment),
    description: `${route.comment}\n\n${accessOf(route)}`,
    'x-allowed': route.allowed,
    security: securityOf(route),
    parameters: [
      ...pathParameters(route),
      ...(await queryParameters(route)),
      ...(route.takesKey ? [{ $ref: '#/components/parameters/IdempotencyKey' }] : []),
    ],
    ...(await requestBody(route, components)),
    responses: { ...successes(route), ...errorsOf(route) },
  }
}

const sorted = <T>(record: Record<string, T>): Record<string, T> =>
  Object.fromEntries(Object.entries(record).sort(([a], [b]) => (a < b ? -1 : 1)))

/** The OpenAPI 3.1 document of every route under server/api, made from the route files and what they name. */
export async function openApiDocument(root: string) {
  const { routes, components } = readRoutes(root)
  const { version } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8')) as { version: string }
  const paths: Record<string, Record<string, unknown>> = {}
  for (const route of routes) (paths[route.path] ??= {})[route.method] = await operation(route, components)
  const error = { content: { 'application/json': { schema: { $ref: '#/components/schemas/Error' } } } }
  return {
    openapi: '3.1.0',
    info: { title: 'Espalier', version, description: INTRODUCTION },
    servers: [{ url: '/', description: 'This server.' }],
    tags: [...new Set(routes.map(({ path }) => path.split('/')[2]!))].sort().map((name) => ({ name })),
    paths: sorted(paths),
    components: {
      securitySchemes: {
        token: { type: 'http', scheme: 'bearer', description: 'Made under People, Tokens.' },
        session: { type: 'apiKey', in: 'cookie', name: 'nuxt-session', description: 'From `POST /api/session`.' },
      },
      parameters: { IdempotencyKey: IDEMPOTENCY_KEY },
      headers: { ...RATE_HEADERS, 'Retry-After': RETRY_AFTER },
      responses: Object.fromEntries(
        Object.entries(ERRORS).map(([status, description]) => [
          status,
          {
            description,
            ...(status === '429' ? { headers: headersNamed('Retry-After', ...Object.keys(RATE_HEADERS)) } : {}),
            ...error,
          },
        ]),
      ),
      schemas: sorted({ ...components, Error: ERROR }),
    },
  }
}

/** The document as it is kept: laid out like every other file. */
export async function documentText(root: string): Promise<string> {
  const path = join(root, 'docs/openapi.json')
  const options = await prettier.resolveConfig(path)
  return prettier.format(JSON.stringify(await openApiDocument(root), null, 1), { ...options, filepath: path })
}
