import type { H3Event } from 'h3'
import { createError, getQuery, getRouterParam, readBody } from 'h3'
import type { z } from 'zod'
import type { ErrorKind, Issue } from '../../shared/errors'
import { DomainError } from '../../shared/errors'

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
  const result = schema.safeParse(input)
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

/** The JSON body of a request, validated. */
export async function bodyOf<T extends z.ZodType>(event: H3Event, schema: T): Promise<z.infer<T>> {
  const body: unknown = await readBody(event).catch(() => {
    throw new DomainError('unreadable', 'request.json', 'The request body is not valid JSON.')
  })
  return parse(schema, body ?? {}, 'The request was understood but cannot be accepted')
}

/** The query of a request, validated. */
export function queryOf<T extends z.ZodType>(event: H3Event, schema: T): z.infer<T> {
  return parse(schema, getQuery(event), 'The address has a part that cannot be accepted')
}

/** A named part of the route, for example `id`. */
export function partOf(event: H3Event, name: string): string {
  const value = getRouterParam(event, name)
  if (!value) throw new DomainError('not found', 'request.route', 'There is nothing at this address.')
  return value
}
