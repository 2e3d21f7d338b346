import type { FetchError } from 'ofetch'
import type { Issue } from '#shared/errors'
import { workspaceHeaders } from '~/utils/team/shownWorkspace'

/** What went wrong with a request, ready to be shown: what, where, what to do. */
export interface ApiFailure {
  status: number
  code: string
  message: string
  issues: Issue[]
}

const OFFLINE: ApiFailure = {
  status: 0,
  code: 'network',
  message: 'The server did not answer. Check the connection and try again; nothing you typed is lost.',
  issues: [],
}

/** A page is shown to who is signed in, so that whoever reads this was: going to the sign-in page would lose what they typed. */
const SIGNED_OUT =
  'You are signed out, here or because it was long ago. Sign in again in another tab, then try again here.'

/** Reads the server's error object out of whatever a request threw. */
export function failureOf(error: unknown): ApiFailure {
  const { statusCode, data } = (error ?? {}) as Partial<FetchError<{ data?: Partial<ApiFailure>; message?: string }>>
  if (!statusCode) return OFFLINE
  const detail = data?.data
  return {
    status: statusCode,
    code: detail?.code ?? 'unknown',
    message:
      (detail?.code === 'session.none' ? SIGNED_OUT : detail?.message) ??
      'The server could not do this. Try again; if it happens again, tell the workspace owner.',
    issues: detail?.issues ?? [],
  }
}

type Body = Record<string, unknown> | FormData
type Method = 'POST' | 'PUT' | 'PATCH' | 'DELETE'

/** The outcome of an action: a value or a failure, never an exception. */
export type Outcome<T> = { ok: true; value: T } | { ok: false; failure: ApiFailure }

/** $fetch without its inference over every route, which exceeds the checker's depth. */
const request = $fetch as <T>(
  url: string,
  options: { method: Method; headers: Record<string, string>; body?: Body; keepalive?: boolean },
) => Promise<T>

/** A change sent while the page is being left goes on only with `keepalive`, which browsers allow for small bodies. */
const KEEPALIVE_CHARACTERS = 16_000
const isSmall = (body: Body | undefined): boolean =>
  !(body instanceof FormData) && JSON.stringify(body ?? {}).length < KEEPALIVE_CHARACTERS

/** Sends changes to the server. */
export function useApi() {
  const send = async <T>(method: Method, url: string, body?: Body): Promise<Outcome<T>> => {
    try {
      return {
        ok: true,
        value: await request<T>(url, {
          ...{ method, body, headers: workspaceHeaders() },
          keepalive: method === 'PATCH' && isSmall(body),
        }),
      }
    } catch (error) {
      return { ok: false, failure: failureOf(error) }
    }
  }
  return {
    post: <T>(url: string, body: Body = {}) => send<T>('POST', url, body),
    put: <T>(url: string, body: Body) => send<T>('PUT', url, body),
    patch: <T>(url: string, body: Body) => send<T>('PATCH', url, body),
    remove: <T = unknown>(url: string, body?: Body) => send<T>('DELETE', url, body),
  }
}
