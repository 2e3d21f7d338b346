/* What a page is made of, so that pages that differ only in their data are told to be alike. */

/** Attributes whose value belongs to what an element is, not to the data it shows. */
const TELLING = ['type', 'role', 'disabled', 'readonly', 'open', 'hidden', 'aria-current', 'aria-invalid']

/** The part between the first `<main` and `</main>`; the whole text where there is none. */
export function mainOf(html: string): string {
  const from = html.indexOf('<main')
  const to = html.lastIndexOf('</main>')
  return from < 0 || to < 0 ? html : html.slice(from, to)
}

/** Addresses on the same site that the page links to, without their fragments. */
export function linksOf(html: string): string[] {
  const hrefs = [...html.matchAll(/<a\s[^>]*?href="([^"]*)"/g)].map(([, href]) => href!.replaceAll('&amp;', '&'))
  const own = hrefs.filter((href) => href.startsWith('/') && !href.startsWith('//') && !href.startsWith('/api/'))
  return [...new Set(own.map((href) => href.split('#')[0]!))]
}

const attributeOf = (attributes: string, name: string): string | undefined =>
  new RegExp(`(?:^|\\s)${name}(?:="([^"]*)")?(?=\\s|$)`).exec(attributes)?.[0]?.trim()

function elementsOf(html: string): string[] {
  return [...html.matchAll(/<([a-z][\w-]*)((?:\s+[^\s"'<>/=]+(?:="[^"]*")?)*)/g)].map(([, tag, attributes = '']) => {
    const scopes = attributes.match(/data-v-\w+/g) ?? []
    const classes = attributeOf(attributes, 'class') ?? ''
    const telling = TELLING.map((name) => attributeOf(attributes, name) ?? '').filter(Boolean)
    return [tag, classes, ...scopes, ...telling].join(' ')
  })
}

/** Words of headings and buttons, without their figures. */
function wordsOf(html: string): string[] {
  return [...html.matchAll(/<(h[2-6]|button)\b[^>]*>(.*?)<\/\1>/gs)].map(([, tag, inside]) => {
    const text = inside!.replace(/<[^>]*>/g, ' ').replace(/[\d.,\u2009\u2212-]+/g, '#')
    return `${tag}: ${text.replace(/\s+/g, ' ').trim()}`
  })
}

/** Levels of headings that follow each other, such as `h2 h3`. */
function headingStepsOf(html: string): string[] {
  const levels = [...html.matchAll(/<(h[1-6])\b/g)].map(([, level]) => level!)
  return levels.slice(1).map((level, i) => `${levels[i]} ${level}`)
}

/** The different kinds of element, words and steps between headings of the main part. */
export function traitsOf(html: string): Set<string> {
  const main = mainOf(html)
  return new Set([...elementsOf(main), ...wordsOf(main), ...headingStepsOf(main)])
}
