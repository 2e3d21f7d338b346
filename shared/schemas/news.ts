import { z } from 'zod'
import { flag, idSchema, pageQuerySchema } from './common'
import type { MailKind } from './mail'

/** What an item of news is about: as the message that tells the same. */
export type NewsKind = MailKind

/** For how long news is kept, from when it was read, or written where nobody read it. */
export const NEWS_KEPT_DAYS = { read: 30, unread: 90 } as const

/** `?unread&limit&cursor` of one’s own news; read and unread where nothing is said. */
export const newsQuerySchema = pageQuerySchema.extend({ unread: flag.optional() })
export type NewsQuery = z.infer<typeof newsQuerySchema>

/** What is marked as read: all that was written until then, so that nothing is that nobody has seen. */
export const readNewsSchema = z.object({ upTo: z.iso.datetime().optional() })

/** `?workspace` of the events: the one that the page shows. */
export const newsEventsQuerySchema = z.object({ workspace: idSchema.optional() })

/** Something that a person is told in a workspace, in plain text. */
export interface NewsItem {
  id: string
  kind: NewsKind
  /** One line that can be understood by itself: “RS-4 waits for review: Berths”. */
  title: string
  /** A sentence or two. */
  text: string
  /** Words of a person, such as a remark. */
  quote: string | null
  /** The page that it is about. */
  path: string
  /** What it is about was deleted since. */
  isGone: boolean
  at: string
  readAt: string | null
}

/** How many one has not read. */
export interface UnreadNews {
  unread: number
}

/** How things stand, as the events tell it; `newest` also where it was read. */
export interface NewsTold extends UnreadNews {
  newest: NewsItem | null
}

export interface NewsView extends UnreadNews {
  items: NewsItem[]
  nextCursor: string | null
}
