/** What a browser and the address it is at say of themselves. */
export interface PasskeyPlace {
  /** HTTPS, or this very machine. */
  isSecure: boolean
  hostname: string
  /** Whether the browser knows of passkeys at all. */
  isKnown: boolean
}

const isNumeric = (hostname: string): boolean => /^[\d.]+$/.test(hostname) || hostname.includes(':')

/** Why passkeys cannot be used here, and what to do; undefined where they can. */
export function passkeyObstacle({ isSecure, hostname, isKnown }: PasskeyPlace): string | undefined {
  if (!isSecure) return 'Passkeys need HTTPS, or localhost.'
  if (isNumeric(hostname)) return 'Passkeys need an address with a name, such as localhost; this one is a number.'
  return isKnown ? undefined : 'This browser knows no passkeys.'
}

const REFUSALS: Record<string, string> = {
  NotAllowedError: 'No passkey was given. It was declined, took too long, or this device has none for this site.',
  InvalidStateError: 'This device holds a passkey of your account already.',
  SecurityError: 'Passkeys of this site are made for another address. Open it there.',
}

/** What it means that a browser gave no passkey, by the name of its error. */
export const passkeyRefusal = (error: unknown): string =>
  REFUSALS[error instanceof Error ? error.name : ''] ?? 'The browser gave no passkey. Try again.'
