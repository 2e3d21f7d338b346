import { DEMO_ACCOUNTS } from '../../../shared/demo-accounts'
import { Client } from '../client'
import { startServer, until } from '../server'
import type { Crawled, DeadLink, Shown, View, Visitor } from './crawl'
import { crawl, tellingViews } from './crawl'
import type { Route } from './routes'

/** The developer sees the most, then those who decide; somebody who is not signed in comes last. */
const ORDER = ['developer', 'reviewer', 'steward', 'owner', 'reader']

const SECRET = 'a-password-of-at-least-thirty-two-characters'

/** Everyone of the demo workspace at this address, and somebody who is not signed in. */
export async function demoVisitors(url: string): Promise<Visitor[]> {
  const names = DEMO_ACCOUNTS.map(({ email }) => email.split('@')[0]!)
  const people = [...names].sort((a, b) => ORDER.indexOf(a) - ORDER.indexOf(b))
  const visitors = people.map(async (person) => ({ person, client: await Client.signedIn(url, person) }))
  return [...(await Promise.all(visitors)), { person: null, client: new Client(url) }]
}

/**
 * An installation that nobody has set up.
 * @param folder with nothing in it, or a database that holds nothing yet
 */
export async function startBare(folder: string) {
  const env = { NUXT_SESSION_PASSWORD: SECRET, ALLOW_PLAIN_HTTP: 'true', DATA_DIR: folder }
  const server = await startServer(env)
  const client = new Client(server.url)
  return {
    server,
    stranger: { person: null, client: new Client(server.url) } satisfies Visitor,
    /** The first owner, in a workspace that holds nothing. */
    async setUp(): Promise<Visitor> {
      const code = await until(() => /one-time code: (\S+)/.exec(server.output())?.[1], 10, 'the code')
      const account = { workspace: 'Nothing yet', name: 'Ann Holm', email: 'ann@example.org', password: SECRET }
      const { status, text } = await client.post('/api/setup', { ...account, code })
      if (status !== 201) throw new Error(`the installation could not be set up: ${text}`)
      return { person: 'first owner', client }
    },
  }
}

/**
 * Views of these visitors that show something new. The first one follows every link; the others look at the fixed pages
 * and at what was telling there, and follow links only to pages that nobody before them had.
 */
export async function exploreAs(
  routes: readonly Route[],
  visitors: readonly Visitor[],
  shown: Shown = new Map(),
): Promise<Crawled> {
  const fixed = routes.filter(({ isDynamic }) => !isDynamic).map(({ pattern }) => pattern)
  const views: View[] = []
  const dead: DeadLink[] = []
  for (const visitor of visitors) {
    const isUnseen = (route: Route): boolean => !views.some((view) => view.route === route)
    const follows = views.length === 0 ? () => true : isUnseen
    const crawled = await crawl(routes, visitor, [...fixed, ...views.map(({ path }) => path)], follows)
    dead.push(...crawled.dead)
    views.push(...tellingViews(crawled.views, shown))
  }
  return { views, dead }
}
