export const MIN_PASSWORD_LENGTH = 12
export const MAX_PASSWORD_LENGTH = 200
const MIN_DISTINCT = 5
/** What is left of a password without its owner's name and address has at least so many characters. */
const MIN_OWN = 8

/** Whose password it is: what anyone would try first. */
export interface PasswordOwner {
  name: string
  email: string
}

const wordsOf = ({ name, email }: PasswordOwner): string[] =>
  [email, ...email.split(/[@._+-]/), ...name.split(/\s+/), 'espalier']
    .map((word) => word.toLowerCase())
    .filter((word) => word.length >= 3)
    .sort((a, b) => b.length - a.length)

/** What can be said against a password without a list of common ones; null when nothing. */
export function passwordFault(password: string, owner: PasswordOwner): string | null {
  const characters = [...password.toLowerCase()]
  if (characters.length < MIN_PASSWORD_LENGTH) return `a password has at least ${MIN_PASSWORD_LENGTH} characters`
  if (new Set(characters).size < MIN_DISTINCT) return 'too few different characters; take several words, for example'
  const own = wordsOf(owner).reduce((left, word) => left.replaceAll(word, ''), characters.join(''))
  return own.length < MIN_OWN ? 'made mostly of the name or the e-mail address, which anyone would try first' : null
}
