import { DomainError } from '../../shared/errors'
import type { UsedPasskey } from '../../shared/schemas/passkeys'
import type { Actor, App } from '../app'
import type { Site } from './passkey-checks'
import { requirePasskey } from './passkey-checks'
import type { Later } from './sign-in'
import { entryOf } from './sign-in'
import { noteRefusedPasskey } from './sign-in-trail'

interface Asking {
  site: Site
  /** Address that the attempt comes from. */
  network: string
  later: Later
}

/** Checks a passkey as `requirePasskey` does; answers whom to sign in and where. */
export async function signInByPasskey(app: App, used: UsedPasskey, { site, network, later }: Asking): Promise<Actor> {
  try {
    return await entryOf(app, (await requirePasskey(app, site, used, network)).id)
  } catch (error) {
    if (error instanceof DomainError && error.code === 'session.passkey')
      later(noteRefusedPasskey(app, used.credential.id, network))
    throw error
  }
}
