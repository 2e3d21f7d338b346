import type { OutboundAnswer } from './outbound'

const isSuccess = (status: number): boolean => status >= 200 && status < 300
const isRedirect = (status: number): boolean => status >= 300 && status < 400

/** Why an answer is no yes; null where it is one. */
export function refusedReason({ status, location }: Pick<OutboundAnswer, 'status' | 'location'>): string | null {
  if (isSuccess(status)) return null
  if (isRedirect(status) && location)
    return `it answered ${status}, a redirect to ${location.slice(0, 200)}; redirects are not followed, so give that address`
  return `it answered ${status}`
}
