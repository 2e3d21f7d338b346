import { dictionary } from '@zxcvbn-ts/language-common'
import { DomainError } from '../../shared/errors'
import type { PasswordOwner } from '../../shared/password-rules'
import { passwordFault } from '../../shared/password-rules'

/** Some 49,000 passwords seen most often in leaks, lower case. */
const COMMON = new Set(dictionary['passwords-common'])

/** Common as it is, or once digits and signs around it are taken away. */
function isCommon(password: string): boolean {
  const text = password.toLowerCase()
  const bare = text.replace(/^[\d\p{P}\p{S}\s]+|[\d\p{P}\p{S}\s]+$/gu, '')
  return COMMON.has(text) || COMMON.has(bare)
}

/** @throws DomainError saying what is wrong with a new password, at the path `password` */
export function requireGoodPassword(password: string, owner: PasswordOwner): void {
  const fault =
    passwordFault(password, owner) ??
    (isCommon(password) ? 'among the passwords that are tried first; take several words, for example' : null)
  if (fault)
    throw new DomainError('not acceptable', 'password.weak', `This password cannot be taken: ${fault}.`, [
      { path: 'password', message: fault },
    ])
}
