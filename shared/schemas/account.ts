/** One place where a person is signed in. */
export interface SignedInView {
  id: string
  /** What the browser said it is. */
  userAgent: string
  /** Address of the network it was last seen from. */
  address: string
  /** Name of the workspace it looks at. */
  workspace: string
  /** Whether it is the one that asks. */
  isThis: boolean
  createdAt: string
  /** To the minute. */
  seenAt: string
}
