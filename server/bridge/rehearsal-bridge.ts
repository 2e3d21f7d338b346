import type { OutboundAnswer } from './outbound'

/** The built-in bridge, for trying out what a team's own one is for: it takes the same calls. */
export async function rehearsalBridge(body: string): Promise<OutboundAnswer> {
  const { event } = JSON.parse(body) as { event: string }
  const text = event === 'test' ? 'The built-in bridge is ready.' : 'unknown event'
  return { status: event === 'test' ? 200 : 400, retryAfter: null, location: null, text }
}
