import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import type { Picture } from './pictures'

const STYLE = `body { font: 14px/1.5 'IBM Plex Sans', sans-serif; margin: 24px; background: #fbfaf6; color: #1e2a26 }
h2 { border-top: 2px solid; padding-top: 8px; font: 600 16px/1.4 'IBM Plex Mono', monospace }
h3 { font-size: 13px; font-weight: 500; margin: 16px 0 4px } .row { display: flex; flex-wrap: wrap; gap: 16px; align-items: flex-start }
figure { margin: 0 } img { height: 360px; max-width: 640px; object-fit: cover; object-position: top; border: 1px solid #d8d3c4 }
figcaption { font-size: 12px; color: #55605a }`

const escaped = (text: string): string => text.replace(/[&<>"]/g, (sign) => `&#${sign.charCodeAt(0)};`)

const figure = ({ file, caption, group }: Picture): string =>
  `<figure><a href="${file}"><img src="${file}" loading="lazy" alt="${escaped(`${group}, ${caption}`)}"></a><figcaption>${escaped(caption)}</figcaption></figure>`

function groupsOf(pictures: readonly Picture[], keyOf: (picture: Picture) => string): Map<string, Picture[]> {
  const groups = new Map<string, Picture[]>()
  for (const picture of pictures) groups.set(keyOf(picture), [...(groups.get(keyOf(picture)) ?? []), picture])
  return groups
}

/** Writes index.html beside the pictures and answers its path. */
export function writeContactSheet(folder: string, pictures: readonly Picture[]): string {
  const sections = [...groupsOf(pictures, ({ heading }) => heading)].map(([heading, inSection]) => {
    const rows = [...groupsOf(inSection, ({ group }) => group)].map(
      ([group, row]) => `<h3>${escaped(group)}</h3><div class="row">${row.map(figure).join('')}</div>`,
    )
    return `<h2>${escaped(heading)}</h2>${rows.join('\n')}`
  })
  const file = join(folder, 'index.html')
  writeFileSync(
    file,
    `<!doctype html><html lang="en"><meta charset="utf-8"><title>Screens</title><style>${STYLE}</style><h1>Screens</h1>${sections.join('\n')}</html>`,
  )
  return file
}
