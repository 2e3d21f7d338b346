import type { NewsTold } from '../../shared/schemas/news'
import type { Actor } from '../app'
import type { Db } from '../database/client'
import type { NewsStanding } from '../database/repositories/news'
import { listNews, newsStandings } from '../database/repositories/news'
import { itemsOf } from './news'

/** So long it takes at most until a change is seen, whichever process made it. */
const LOOK_MS = 1000

/** Who is told, of what they are told in one workspace. */
interface Follower extends Actor {
  readonly sessionId: string
  readonly told: (news: NewsTold) => void
  /** The session ended or went to another workspace: nothing more is told. */
  readonly over: () => void
  /** What was told last. */
  last: string
}

const keyOf = ({ unread, newestAt }: NewsStanding): string => `${unread} ${newestAt?.getTime() ?? '-'}`

/**
 * Tells those who follow their news when there is more of it, or less that is unread. However many follow, it is one look
 * at the database a second for all of them in this process, and none while nobody does: what another process wrote is
 * seen as soon as what this one did, and a session that ended anywhere is told no more.
 */
export class NewsWatch {
  private readonly followers = new Set<Follower>()
  private timer: ReturnType<typeof setInterval> | undefined
  private busy = false
  private stopped = false

  constructor(
    private readonly db: Db,
    private readonly now: () => Date,
  ) {}

  /** Tells how things stand at once, then whenever that changes. @returns how to end it */
  follow(caller: Omit<Follower, 'last'>): () => void {
    const follower = { ...caller, last: '' }
    this.followers.add(follower)
    if (this.stopped) this.end(follower)
    else this.begin()
    return () => this.leave(follower)
  }

  private begin(): void {
    this.timer ??= setInterval(() => void this.look(), LOOK_MS).unref()
    void this.look()
  }

  /** Ends what everybody follows: their browsers ask again, then another process. */
  stop(): void {
    this.stopped = true
    for (const follower of this.followers) this.end(follower)
  }

  private leave(follower: Follower): void {
    this.followers.delete(follower)
    if (this.followers.size > 0) return
    clearInterval(this.timer)
    this.timer = undefined
  }

  private end(follower: Follower): void {
    this.leave(follower)
    follower.over()
  }

  /** A look that takes long must not pile up further ones. */
  private async look(): Promise<void> {
    if (this.busy) return
    this.busy = true
    await this.tellAll().catch((error: Error) => console.error(`news: ${error.message}`))
    this.busy = false
  }

  private async tellAll(): Promise<void> {
    const asked = [...this.followers]
    const ids = [...new Set(asked.map(({ sessionId }) => sessionId))]
    const standings = new Map((await newsStandings(this.db, ids, this.now())).map((row) => [row.sessionId, row]))
    for (const follower of asked) {
      const standing = standings.get(follower.sessionId)
      if (standing?.workspaceId !== follower.workspaceId) this.end(follower)
      else if (keyOf(standing) !== follower.last) await this.tell(follower, standing)
    }
  }

  private async tell(follower: Follower, standing: NewsStanding): Promise<void> {
    const rows = await listNews(this.db, follower, { unread: false, limit: 1 })
    const [newest = null] = await itemsOf(this.db, rows)
    follower.last = keyOf(standing)
    if (this.followers.has(follower)) follower.told({ unread: standing.unread, newest })
  }
}
