import { describe, expect, it } from 'vitest'
import type { PageAnswer } from '../../support/client'
import { Client } from '../../support/client'
import { crawl, tellingViews } from '../../support/pages/crawl'
import { linksOf, traitsOf } from '../../support/pages/markup'
import type { Route } from '../../support/pages/routes'
import { patternOf, routeOf } from '../../support/pages/routes'

const route = (pattern: string): Route => ({ pattern, file: `${pattern}.vue`, isDynamic: pattern.includes(':') })
const ROUTES = ['/', '/things', '/things/new', '/lost/:id', '/things/:id', '/things/:id/parts'].map(route)

describe('routes', () => {
  it.each([
    ['index.vue', '/'],
    ['things/index.vue', '/things'],
    ['things/[id]/index.vue', '/things/:id'],
    ['things/[id]/parts.vue', '/things/:id/parts'],
    ['(team)/people.vue', '/people'],
    ['files/[...path].vue', '/files/:path(.*)*'],
    ['[[page]].vue', '/:page?'],
  ])('%s is %s', (file, pattern) => expect(patternOf(file)).toBe(pattern))

  it.each([
    ['/', '/'],
    ['/things', '/things'],
    ['/things/', '/things'],
    ['/things/new', '/things/new'],
    ['/things/7', '/things/:id'],
    ['/things/7/parts', '/things/:id/parts'],
    ['/things/7/parts/8', undefined],
  ])('%s leads to %s', (path, pattern) => expect(routeOf(ROUTES, path)?.pattern).toBe(pattern))

  it('takes what is optional or long', () => {
    const routes = ['/files/:path(.*)*', '/lists/:page?'].map(route)
    for (const path of ['/files', '/files/a', '/files/a/b']) expect(routeOf(routes, path)).toBe(routes[0])
    for (const path of ['/lists', '/lists/2']) expect(routeOf(routes, path)).toBe(routes[1])
  })
})

describe('markup', () => {
  it('finds links on the same site', () =>
    expect(
      linksOf(
        '<a class="x" href="/a?b=1&amp;c=2#d">1</a><a href="/a?b=1&amp;c=2">2</a><a href="/api/f">3</a><a href="//x">4</a><a href="https://x">5</a>',
      ),
    ).toEqual(['/a?b=1&c=2']))

  const main = (inside: string) => `<nav><a href="/">x</a></nav><main class="m">${inside}</main><footer>y</footer>`

  it('is the same for other figures and names', () =>
    expect(traitsOf(main('<h1>P-1</h1><td data-v-1 class="n">7</td><button>Save 3 rows</button>'))).toEqual(
      traitsOf(
        main('<h1>P-22</h1><td data-v-1 class="n">12.5</td><td data-v-1 class="n">8</td><button>Save 14 rows</button>'),
      ),
    ))

  it.each([
    ['an element', '<p>1</p>', '<p>1</p><ul></ul>'],
    ['a class', '<p class="a">1</p>', '<p class="b">1</p>'],
    ['a state', '<button>Save</button>', '<button disabled>Save</button>'],
    ['a word on a button', '<button>Save</button>', '<button>Stop</button>'],
    ['a heading', '<h2>Chains</h2>', '<h2>Breaks</h2>'],
    ['a step between headings', '<h2>A</h2><h3>B</h3><h2>A</h2>', '<h2>A</h2><h2>A</h2><h3>B</h3>'],
  ])('differs by %s', (_, one, other) => expect(traitsOf(main(one))).not.toEqual(traitsOf(main(other))))
})

/** Answers from a record of pages; an address in place of a page sends the visitor there. */
class Fake extends Client {
  constructor(private readonly pages: Record<string, string>) {
    super('http://127.0.0.1')
  }

  override async page(path: string): Promise<PageAnswer> {
    const text = this.pages[path]
    if (text?.startsWith('/')) return this.page(text)
    return { status: text === undefined ? 404 : 200, text: text ?? '', endedAt: path }
  }
}

describe('crawling', () => {
  const link = (...hrefs: string[]) =>
    `<main><h1>x</h1>${hrefs.map((href) => `<a href="${href}">x</a>`).join('')}</main>`
  const client = new Fake({
    '/': link('/things/1', '/things/2', '/things/9', '/elsewhere'),
    '/things': link('/'),
    '/things/new': '/things',
    '/things/1': link('/things/1/parts'),
    '/things/2': '<main><h1>x</h1><h1>y</h1></main>',
    '/things/3': link(),
    '/things/1/parts': link(),
  })
  const visitor = { person: 'somebody', client }

  it('finds what is linked to, ends where it is sent to, and tells links that lead nowhere', async () => {
    const { views, dead } = await crawl(ROUTES, visitor, ['/', '/things/new'], () => true)
    expect(views.map(({ path }) => path)).toEqual(['/', '/things', '/things/1', '/things/2', '/things/1/parts'])
    expect(views.map(({ headings }) => headings)).toEqual([1, 1, 1, 2, 1])
    expect(dead).toEqual([{ path: '/things/9', from: '/', person: 'somebody', status: 404 }])
  })

  it('leaves a page out that nothing links to', async () => {
    const { views } = await crawl(ROUTES, visitor, ['/'], () => true)
    expect(views.map(({ route }) => route.pattern)).not.toContain('/lost/:id')
  })

  it('follows no links to pages that are not wanted', async () => {
    const { views } = await crawl(ROUTES, visitor, ['/'], ({ pattern }) => pattern !== '/things/:id')
    expect(views.map(({ path }) => path)).toEqual(['/'])
  })

  it('takes one view of what is made of the same parts', async () => {
    const { views } = await crawl(ROUTES, visitor, ['/things/1', '/things/3'], () => false)
    const [first, second] = views
    expect(tellingViews([first!, second!])).toEqual([first])
    expect(tellingViews([second!, first!])).toEqual([second, first])
  })
})
