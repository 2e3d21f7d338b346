import type { H3Event } from 'h3'
import { useSession } from 'h3'
import type { KeptHandshake } from '../services/handshakes'

const OPEN_SECONDS = 5 * 60

/** A sealed cookie beside that of the session; it goes with whoever comes back from the provider by a link (`lax`). */
const sealed = (event: H3Event) => {
  const { password, cookie } = useRuntimeConfig(event).session
  const secure = cookie && typeof cookie === 'object' ? cookie.secure : true
  const settings = { httpOnly: true, sameSite: 'lax' as const, secure, maxAge: OPEN_SECONDS }
  return useSession<{ kept: KeptHandshake }>(event, {
    ...{ name: 'espalier-provider', password, maxAge: OPEN_SECONDS, cookie: settings },
  })
}

/** Lets the browser keep what ties it to somebody sent to the provider. */
export async function keepHandshake(event: H3Event, kept: KeptHandshake): Promise<void> {
  await (await sealed(event)).update({ kept })
}

/** What this browser kept, once; null where it kept nothing. */
export async function takeHandshake(event: H3Event): Promise<KeptHandshake | null> {
  const session = await sealed(event)
  const kept = session.data.kept ?? null
  await session.clear()
  return kept
}
