import type { Client } from '../client'
import { linksOf, traitsOf } from './markup'
import type { Route } from './routes'
import { routeOf } from './routes'

/** One page as one person sees it. */
export interface View {
  readonly route: Route
  /** Address with its query. */
  readonly path: string
  /** Who looks; null for somebody who is not signed in. */
  readonly person: string | null
  readonly client: Client
  /** What the page is made of: see `traitsOf`. */
  readonly traits: ReadonlySet<string>
  /** Of the first level, in the page as served. */
  readonly headings: number
}

export interface Visitor {
  readonly person: string | null
  readonly client: Client
}

/** An address that was linked to but not answered with its page. */
export interface DeadLink {
  readonly path: string
  readonly from: string
  readonly person: string | null
  readonly status: number
}

export interface Crawled {
  readonly views: View[]
  readonly dead: DeadLink[]
}

/** Links to one page that are followed: more of them lead to what looks the same. */
const MOST_OF_A_KIND = 20

/**
 * Looks at the addresses given and follows links from them until nothing new is found. An address that is answered by
 * sending the visitor elsewhere counts as the page it ends at.
 *
 * @param follows whether links to this page are followed
 */
export async function crawl(
  routes: readonly Route[],
  visitor: Visitor,
  starts: readonly string[],
  follows: (route: Route) => boolean,
): Promise<Crawled> {
  const known = new Set(starts)
  const queue = [...known].map((path) => ({ path, from: '' }))
  const followed = new Map<Route, number>()
  const views: View[] = []
  const dead: DeadLink[] = []
  for (const { path, from } of queue) {
    const { status, text, endedAt } = await visitor.client.page(path)
    if (status !== 200) {
      if (from) dead.push({ path, from, person: visitor.person, status })
      continue
    }
    const route = routeOf(routes, pathOf(endedAt))
    if (route) views.push(viewOf(route, endedAt, visitor, text))
    for (const link of linksOf(text)) {
      const target = routeOf(routes, pathOf(link))
      const count = (target && followed.get(target)) ?? 0
      if (known.has(link) || !target || !follows(target) || count >= MOST_OF_A_KIND) continue
      known.add(link)
      followed.set(target, count + 1)
      queue.push({ path: link, from: path })
    }
  }
  return { views, dead }
}

const pathOf = (address: string): string => address.split('?')[0]!

function viewOf(route: Route, path: string, { person, client }: Visitor, html: string): View {
  return { route, path, person, client, traits: traitsOf(html), headings: html.match(/<h1\b/g)?.length ?? 0 }
}

/** Traits of each page, by pattern, that views chosen before have shown. */
export type Shown = Map<string, Set<string>>

/** Views that show something no view of the same page before them has, in the order given; `shown` is added to. */
export function tellingViews(views: readonly View[], shown: Shown = new Map()): View[] {
  return views.filter(({ route, traits }) => {
    const before = shown.get(route.pattern)
    const isNew = !before || [...traits].some((trait) => !before.has(trait))
    if (isNew) shown.set(route.pattern, new Set([...(before ?? []), ...traits]))
    return isNew
  })
}
