import type { NewsTold } from '#shared/schemas/news'
import { WORKSPACE_HEADER } from '#shared/workspace-header'
import { followEvents } from './eventStream'

/** How one’s news stands; or that nothing more is told, because the session ended or went to another workspace. */
export type NewsReport = { told: NewsTold } | 'over'

/** Follows one’s news of a workspace. @returns how to end it */
export const openNewsStream = (workspaceId: string, report: (report: NewsReport) => void): (() => void) =>
  followEvents({
    url: `/api/news/events?workspace=${encodeURIComponent(workspaceId)}`,
    event: 'news',
    take: (data) => report({ told: JSON.parse(data) as NewsTold }),
    isOver: async () => {
      const { status } = await fetch('/api/news/unread', { headers: { [WORKSPACE_HEADER]: workspaceId } })
      return status === 401 || status === 409
    },
    over: () => report('over'),
  })
