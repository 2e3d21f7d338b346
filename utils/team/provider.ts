const WORDS: Record<string, string> = {
  'challenge.gone': 'This took longer than five minutes. Begin again.',
  'provider.declined': 'The provider did not sign you in. Try again.',
  'provider.refused': 'What the provider answered does not fit. Begin again.',
  'provider.browser': 'This was begun in another browser, or by somebody else. Begin again.',
  'provider.unreachable': 'The provider did not answer. Try again later.',
  'identity.unknown':
    'No account here has the address that the provider says, and nobody invited it. Sign in another way and link your account, or ask an owner for an invitation.',
  'identity.unverified':
    'The provider confirms no address of yours. Sign in another way, and link your account on its page.',
  'identity.other': 'The account with your address is linked to somebody else at the provider. Sign in another way.',
  'identity.other-address': 'The invitation is for another address than the provider says.',
  'identity.taken': 'Another account here is linked to you at the provider already.',
  'identity.linked': 'Your account is linked already. Unlink it first.',
  'invitation.gone': 'This invitation is no longer open. Ask whoever invited you to send it again.',
  'session.nowhere': 'You belong to no workspace any more. Ask an owner of one for an invitation.',
}

/** Why the provider’s answer opened nothing, by the code in the address; undefined where there is none. */
export function providerRefusal(code: unknown): string | undefined {
  if (typeof code !== 'string') return undefined
  return WORDS[code] ?? 'The provider’s answer opened nothing here. Begin again.'
}
