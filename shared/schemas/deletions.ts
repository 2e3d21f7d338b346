/** What a person can delete and, for a while, bring back. */
export type DeletableKind = 'problem' | 'embedding' | 'run sheet'

/** Answer to a deletion. */
export interface DeletionView {
  ok: true
  /** Until then `POST …/restore` brings it back whole; ISO 8601, UTC. */
  restorableUntil: string
}
