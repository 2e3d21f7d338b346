import type { H3Event } from 'h3'
import { getRequestURL } from 'h3'
import type { Site } from '../services/passkey-checks'

/**
 * Where visitors reach the product: `PUBLIC_URL`, or as this request says. Headers of a reverse proxy count where
 * `TRUST_PROXY` says that there is one.
 */
export function siteOf(event: H3Event): Site {
  const hasProxy = process.env.TRUST_PROXY === 'true'
  const asked = getRequestURL(event, { xForwardedHost: hasProxy, xForwardedProto: hasProxy })
  const { PUBLIC_URL: known } = process.env
  const { origin, hostname } = known ? new URL(known) : asked
  return { address: known ? known.replace(/\/+$/, '') : origin, origin, hostname }
}
