import { existsSync, mkdirSync, rmSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { parseArgs } from 'node:util'
import type { Browser } from 'playwright-core'
import { launch } from '../../tests/support/browser'
import type { View, Visitor } from '../../tests/support/pages/crawl'
import { crawl, tellingViews } from '../../tests/support/pages/crawl'
import { findRoutes } from '../../tests/support/pages/routes'
import { prepareRunning, prepareStates } from '../../tests/support/pages/states'
import { demoVisitors, exploreAs, startBare } from '../../tests/support/pages/worlds'
import type { RunningServer } from '../../tests/support/server'
import { startServer, temporaryFolder } from '../../tests/support/server'
import { ensureBuild } from '../build.mjs'
import { writeContactSheet } from './contact-sheet'
import type { Picture } from './pictures'
import { takePictures } from './pictures'
import { takeLenses } from './vision'

const HELP = `npm run screens -- [options]

Pictures of every page and state in screens/, light and dark, 1440 × 900 and 390 × 844, with a contact sheet.

  --url URL      a demo server that runs already; without it, one is built and started, and brought into more states
  --only TEXT    pages whose pattern holds TEXT, such as /embeddings
  --vision       in place of the pages, the three lenses of the lattice as seen with deficient colour vision
`

const root = fileURLToPath(new URL('../..', import.meta.url))

interface Session {
  readonly browser: Browser
  readonly folder: string
  readonly routes: ReturnType<typeof findRoutes>
  readonly shown: Map<string, Set<string>>
  readonly pictures: Picture[]
}

/** Entry of `npm run screens`. */
export async function run(args: string[]): Promise<void> {
  const { values } = parseArgs({
    args,
    options: {
      url: { type: 'string' },
      only: { type: 'string', default: '' },
      vision: { type: 'boolean', default: false },
      help: { type: 'boolean', default: false },
    },
  })
  if (values.help) return console.log(HELP)
  const folder = `${root}screens${values.vision ? '/vision' : ''}`
  if (existsSync(folder)) rmSync(folder, { recursive: true })
  mkdirSync(folder, { recursive: true })
  const browser = await launch()
  const routes = findRoutes(`${root}pages`)
  const session = { browser, folder, routes, shown: new Map(), pictures: [] as Picture[] }
  const servers: RunningServer[] = []
  try {
    if (values.vision)
      session.pictures.push(...(await takeLenses(browser, folder, routes, await demoAt(values.url, servers))))
    else {
      await pagesOfDemo(session, values.only, await demoAt(values.url, servers), !values.url)
      if (!values.url) await pagesOfBare(session, values.only, servers)
    }
    const file = writeContactSheet(folder, session.pictures)
    console.log(`${session.pictures.length} pictures, all of them on ${file}`)
  } finally {
    await browser.close()
    await Promise.all(servers.map((server) => server.stop()))
  }
}

/** Address of a demo server: the one given, or one that is started here. */
async function demoAt(url: string | undefined, servers: RunningServer[]): Promise<string> {
  if (url) return url
  ensureBuild()
  const server = await startServer({ DEMO: 'true', DATA_DIR: temporaryFolder() })
  servers.push(server)
  return server.url
}

async function pagesOfDemo(session: Session, only: string, url: string, isOurs: boolean): Promise<void> {
  const visitors = await demoVisitors(url)
  if (isOurs) await prepareStates(url)
  await picturesAs(session, only, visitors)
  if (!isOurs) return
  const running = await prepareRunning(url)
  const { views } = await crawl(session.routes, visitors[0]!, running.paths, () => false)
  await pictures(session, only, tellingViews(views, session.shown))
  await running.stop()
}

async function pagesOfBare(session: Session, only: string, servers: RunningServer[]): Promise<void> {
  const { server, stranger, setUp } = await startBare(temporaryFolder())
  servers.push(server)
  await picturesAs(session, only, [stranger])
  await picturesAs(session, only, [await setUp()])
}

async function picturesAs(session: Session, only: string, visitors: Visitor[]): Promise<void> {
  const { views } = await exploreAs(session.routes, visitors, session.shown)
  await pictures(session, only, views)
}

async function pictures(session: Session, only: string, views: readonly View[]): Promise<void> {
  const wanted = views.filter(({ route }) => route.pattern.includes(only))
  for (const view of wanted) session.pictures.push(...(await takePictures(session.browser, session.folder, view)))
}
