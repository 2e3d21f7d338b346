import type { H3Event } from 'h3'
import { getHeader } from 'h3'
import { DomainError } from '../../shared/errors'

/**
 * The token of a request, from `Authorization: Bearer …`; undefined where the header is missing.
 * @throws DomainError unauthenticated, for any other kind of authorisation: a session beside it is not looked at
 */
export function bearerOf(event: H3Event): string | undefined {
  const header = getHeader(event, 'authorization')
  if (header === undefined) return undefined
  const token = /^Bearer +([\w-]{1,200})$/i.exec(header.trim())?.[1]
  if (token) return token
  throw new DomainError('unauthenticated', 'token.form', 'Write the header as “Authorization: Bearer” and the token.')
}
