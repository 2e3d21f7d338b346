import type { Letter } from './letter'
import { oneLine } from './letter'

const NOT_YOU =
  'If it was not you, ask an owner of your workspace to remove you from it until your mailbox and your password are safe.'

/** A link by which a forgotten password is replaced. @param path of the page behind the secret link */
export const passwordLetter = (path: string): Letter => ({
  kind: 'new password',
  subject: 'A new password for Espalier',
  parts: [
    { text: 'Somebody asked for a new password for the account with this address.' },
    {
      text: 'The link holds for one hour and can be used once. If you did not ask for it, do nothing: the password stays as it is.',
    },
  ],
  action: { label: 'Choose a new password', path },
  because: 'this address belongs to an account, and a new password was asked for it',
})

/** @param how it was changed: completes “Your password was changed …” */
export const passwordChangedLetter = (how: string): Letter => ({
  kind: 'password changed',
  subject: 'Your password for Espalier was changed',
  parts: [
    { text: `Your password was changed ${how}. Wherever else you were signed in, you no longer are.` },
    { text: 'If it was not you, ask for another new password at once.' },
  ],
  action: { label: 'Ask for a new password', path: '/reset' },
  because: 'it is the password of your account',
})

/** A link by which somebody shows that a new address is theirs. @param path of the page behind the secret link */
export const addressLetter = (name: string, path: string): Letter => ({
  kind: 'new address',
  subject: 'Confirm your new address for Espalier',
  parts: [
    { text: `${oneLine(name)} wants to use this address for signing in to Espalier, and for its messages.` },
    {
      text: 'The link holds for one hour and can be used once. If you do not know what this is about, do nothing: nothing changes.',
    },
  ],
  action: { label: 'Confirm the address', path },
  because: `${oneLine(name)} gave this address for an account`,
})

/** To the address that was left. */
export const addressChangedLetter = (name: string, email: string): Letter => ({
  kind: 'address changed',
  subject: 'Your address for Espalier was changed',
  parts: [
    {
      text: `The account of ${oneLine(name)} now has the address ${oneLine(email)}. Nothing more is sent to this one.`,
    },
    { text: NOT_YOU },
  ],
  action: { label: 'Open Espalier', path: '/' },
  because: 'this was the address of the account until now',
})

/** @param what was done on the page of the account, such as “the passkey Phone was added” */
export const signInChangedLetter = (what: string): Letter => ({
  kind: 'sign-in changed',
  subject: 'Your way to sign in to Espalier was changed',
  parts: [{ text: `On the page of your account, ${oneLine(what)}.` }, { text: NOT_YOU }],
  action: { label: 'Look at your account', path: '/account' },
  because: 'it concerns how your account is opened',
})
