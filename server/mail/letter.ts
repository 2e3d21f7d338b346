import type { MailKind } from '../../shared/schemas/mail'
import { isChosenMail } from '../../shared/schemas/mail'

/** A line of a list, with the page that it is about and what else belongs to it. */
export interface LetterItem {
  text: string
  /** Path of a page of the product. */
  path: string
  under?: readonly string[]
}

/** Words of our own, the words of a person, or a list. */
export type LetterPart = { text: string } | { quote: string } | { list: readonly LetterItem[] }

/** A message before it is written out: one source of the plain text and of the HTML. */
export interface Letter {
  kind: MailKind
  subject: string
  parts: readonly LetterPart[]
  /** Where it leads. */
  action: { label: string; path: string }
  /** Why this person is written to: completes “You get this because …”. */
  because: string
}

export interface WrittenLetter {
  subject: string
  text: string
  html: string
}

const MAX_SUBJECT = 160

/** Line ends, other controls, and marks that turn the direction of the text round. */
const UNSAFE = /[\p{Cc}\p{Zl}\p{Zp}\u200E\u200F\u202A-\u202E\u2066-\u2069]+/gu

/** Text for a header: one line, whatever was typed into a name, and of a length that can be read. */
export function oneLine(text: string): string {
  const line = text.replace(UNSAFE, ' ').replace(/ {2,}/g, ' ').trim()
  const characters = [...line]
  return characters.length > MAX_SUBJECT ? `${characters.slice(0, MAX_SUBJECT - 1).join('')}…` : line
}

/** Where a person chooses among the messages of a workspace. */
const WISHES = { label: 'Choose which messages you get', path: '/account#messages' }

/** The plain text of a message; links stand on lines of their own, so that every reader finds their ends. */
function textOf({ kind, parts, action, because }: Letter, site: string): string {
  const blocks = parts.map((part) => {
    if ('text' in part) return lineByLine(part.text)
    if ('quote' in part)
      return lineByLine(part.quote)
        .split('\n')
        .map((line) => `> ${line}`.trimEnd())
        .join('\n')
    return part.list.map((item) => listedText(item, site)).join('\n')
  })
  const wishes = isChosenMail(kind) ? `\n${WISHES.label}: ${site}${WISHES.path}` : ''
  const end = `-- \nYou get this because ${oneLine(because)}.${wishes}\nEspalier, ${site}/`
  return `${[...blocks, `${action.label}:\n${site}${action.path}`, end].join('\n\n')}\n`
}

/** Text of several lines without anything unseen in them. */
export const lineByLine = (text: string): string =>
  text
    .split(/\r\n|\r|\n/)
    .map((line) => line.replace(UNSAFE, ' ').trimEnd())
    .join('\n')

const listedText = ({ text, path, under = [] }: LetterItem, site: string): string =>
  [`- ${lineByLine(text)}`, ...[`${site}${path}`, ...under.map(lineByLine)].map((line) => `  ${line}`)].join('\n')

const ESCAPES: Record<string, string> = { '&': '&amp;', '<': '&lt;', '>': '&gt;', '"': '&quot;', "'": '&#39;' }
const escapeHtml = (text: string): string => text.replace(/[&<>"']/g, (character) => ESCAPES[character]!)
const inHtml = (text: string): string => escapeHtml(lineByLine(text)).replace(/\n/g, '<br>')

/** Colours of the product's light theme; mail programs take neither variables nor style sheets. */
const STYLE = {
  body: 'margin:0;padding:24px;background:#FBFAF6;color:#1E2A26;font:16px/1.5 "IBM Plex Sans",Helvetica,Arial,sans-serif',
  page: 'max-width:36rem;margin:0 auto',
  title:
    'margin:0 0 16px;padding-bottom:8px;border-bottom:2px solid #1E2A26;font-size:20px;line-height:1.3;font-weight:500',
  paragraph: 'margin:0 0 16px',
  quote: 'margin:0 0 16px;padding:0 0 0 12px;border-left:3px solid #7C857F;color:#55605A',
  list: 'margin:0 0 16px;padding:0 0 0 20px',
  item: 'margin:0 0 8px',
  under: 'color:#55605A',
  link: 'color:#1F5D4C;text-decoration:underline',
  end: 'margin:24px 0 0;padding-top:8px;border-top:1px solid #D8D3C4;font-size:13px;color:#55605A',
} as const

const link = (label: string, address: string): string =>
  `<a href="${escapeHtml(address)}" style="${STYLE.link}">${inHtml(label)}</a>`

function partHtml(part: LetterPart, site: string): string {
  if ('text' in part) return `<p style="${STYLE.paragraph}">${inHtml(part.text)}</p>`
  if ('quote' in part) return `<blockquote style="${STYLE.quote}">${inHtml(part.quote)}</blockquote>`
  const items = part.list.map(({ text, path, under = [] }) => {
    const more = under.map((line) => `<br><span style="${STYLE.under}">${inHtml(line)}</span>`).join('')
    return `<li style="${STYLE.item}">${link(text, site + path)}${more}</li>`
  })
  return `<ul style="${STYLE.list}">${items.join('')}</ul>`
}

function htmlOf({ kind, subject, parts, action, because }: Letter, site: string): string {
  const title = escapeHtml(oneLine(subject))
  const wishes = isChosenMail(kind) ? `<br>${link(WISHES.label, site + WISHES.path)}` : ''
  const body = parts.map((part) => partHtml(part, site)).join('\n')
  return `<!doctype html>
<html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width, initial-scale=1"><meta name="color-scheme" content="light only"><title>${title}</title></head>
<body style='${STYLE.body}'><div style="${STYLE.page}">
<h1 style="${STYLE.title}">${title}</h1>
${body}
<p style="${STYLE.paragraph}">${link(action.label, site + action.path)}</p>
<p style="${STYLE.end}">You get this because ${inHtml(oneLine(because))}.${wishes}<br>Espalier, ${link(site, `${site}/`)}</p>
</div></body></html>
`
}

/**
 * Writes a message out as plain text and as HTML that says the same and asks no other host for anything.
 * @param site address of the product, without a slash at its end
 */
export const writeLetter = (letter: Letter, site: string): WrittenLetter => ({
  subject: oneLine(letter.subject),
  text: textOf(letter, site),
  html: htmlOf(letter, site),
})
