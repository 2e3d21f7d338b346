import type { H3Event } from 'h3'
import { createError, getHeader, getQuery, getRouterParam, readBody } from 'h3'
import type { z } from 'zod'
import type { ErrorKind, Issue } from '../../shared/errors'
import { DomainError } from '../../shared/errors'
import { idSchema } from '../../shared/schemas/common'
import { issueWords } from './issue-words'

const STATUS: Record<ErrorKind, number> = {
  unreadable: 400,
  unauthenticated: 401,
  forbidden: 403,
  'not found': 404,
  'wrong state': 409,
  'too large': 413,
  'not acceptable': 422,
  'too many': 429,
}

const STATUS_TEXT: Record<number, string> = {
  400: 'Bad Request',
  401: 'Unauthorized',
  403: 'Forbidden',
  404: 'Not Found',
  409: 'Conflict',
  413: 'Payload Too Large',
  422: 'Unprocessable Content',
  429: 'Too Many Requests',
}

/** The one mapping from domain errors to HTTP. */
export function toHttpError(error: DomainError) {
  const statusCode = STATUS[error.kind]
  return createError({
    statusCode,
    statusMessage: STATUS_TEXT[statusCode],
    message: error.message,
    data: { code: error.code, message: error.message, ...(error.issues.length > 0 ? { issues: error.issues } : {}) },
  })
}

/** Parses unknown input with a schema; the error names every field that was wrong. */
export function parse<T extends z.ZodType>(schema: T, input: unknown, what: string): z.infer<T> {
  const result = schema.safeParse(input, { error: issueWords })
  if (result.success) return result.data
  const issues: Issue[] = result.error.issues.map((issue) => ({ path: issue.path.join('.'), message: issue.message }))
  const first = issues[0]!
  throw new DomainError(
    'not acceptable',
    'request.fields',
    `${what}: ${first.path ? `${first.path}: ` : ''}${first.message}`,
    issues,
  )
}

const BODY_LIMIT_BYTES = 16 * 2 ** 20

/** A body is read into memory whole, so its length has to be stated and within the limit before it is read. */
export function requireModestBody(event: H3Event): void {
  if (getHeader(event, 'transfer-encoding'))
    throw new DomainError('unreadable', 'request.length', 'State the length of the request body (Content-Length).')
  if (Number(getHeader(event, 'content-length') ?? 0) > BODY_LIMIT_BYTES)
    throw new DomainError(
      'too large',
      'request.size',
      `The request body is larger than the ${BODY_LIMIT_BYTES / 2 ** 20} MiB that are taken here.`,
    )
}

/** The JSON body of a request, validated. */
export async function bodyOf<T extends z.ZodType>(event: H3Event, schema: T): Promise<z.infer<T>> {
  requireModestBody(event)
  const body: unknown = await readBody(event).catch(() => {
    throw new DomainError(
      'unreadable',
      'request.json',
      'The request body is not valid JSON, or it has a key such as __proto__.',
    )
  })
  return parse(schema, body ?? {}, 'The request was understood but cannot be accepted')
}

/** The query of a request, validated. */
export function queryOf<T extends z.ZodType>(event: H3Event, schema: T): z.infer<T> {
  return parse(schema, getQuery(event), 'The address has a part that cannot be accepted')
}

/** A named part of the route that is an id. */
export function partOf(event: H3Event, name: string): string {
  const value = getRouterParam(event, name)
  if (!idSchema.safeParse(value).success)
    throw new DomainError('not found', 'request.route', 'There is nothing at this address.')
  return value!
}
