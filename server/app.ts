import type { Outbound } from './bridge/outbound'
import type { Database, Db } from './database/client'
import type { BlobStore } from './database/repositories/blobs'
import type { Provider } from './identity/provider'
import type { Queue } from './jobs/queue'
import type { KeptUploads } from './services/kept-uploads'
import type { NewsWatch } from './services/news-watch'
import type { Compute } from './workers/compute'

/** What every use case is given. Made once per process by `startApp`; services never see an HTTP event. */
export interface App {
  readonly database: Database
  readonly db: Db
  readonly blobs: BlobStore
  readonly compute: Compute
  readonly queue: Queue
  readonly uploads: KeptUploads
  readonly newsWatch: NewsWatch
  readonly outbound: Outbound
  /** Outside identity provider; null where there is none. */
  readonly provider: Provider | null
  readonly now: () => Date
  readonly version: string
  readonly demo: boolean
}

/** Who asks, in which workspace: the outcome of the role check. */
export interface Actor {
  readonly userId: string
  readonly workspaceId: string
}
