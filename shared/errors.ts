/** What kind of refusal an error is; the HTTP layer maps it to a status. */
export type ErrorKind =
  | 'unreadable'
  | 'not acceptable'
  | 'not found'
  | 'wrong state'
  | 'forbidden'
  | 'unauthenticated'
  | 'too large'
  | 'too many'

/** One thing that was wrong, and where. */
export interface Issue {
  path?: string
  line?: number
  message: string
}

/** An error whose message may be shown to the person: it says what was wrong and what to do. */
export class DomainError extends Error {
  constructor(
    readonly kind: ErrorKind,
    /** Stable, machine-readable, for example `problem.empty`. */
    readonly code: string,
    message: string,
    readonly issues: readonly Issue[] = [],
  ) {
    super(message)
    this.name = 'DomainError'
  }
}

/** Refused for a while, because there were too many before. */
export class TooManyError extends DomainError {
  constructor(
    code: string,
    message: string,
    readonly retryAfterSeconds: number,
  ) {
    super('too many', code, message)
  }
}
