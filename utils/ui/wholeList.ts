import type { Page } from '#shared/schemas/common'

const PER_PAGE = 200

/**
 * A list to its end, a page after the other, as one page; what the first page says beside its items stays.
 * @param address of the list, with or without a query
 */
export async function wholeList<T extends Page<unknown>>(
  address: string,
  readPage: (address: string) => Promise<T>,
): Promise<T> {
  const paged = `${address}${address.includes('?') ? '&' : '?'}limit=${PER_PAGE}`
  const first = await readPage(paged)
  const items = [...first.items]
  let cursor = first.nextCursor
  while (cursor !== null) {
    const page = await readPage(`${paged}&cursor=${encodeURIComponent(cursor)}`)
    items.push(...page.items)
    cursor = page.nextCursor
  }
  return { ...first, items, nextCursor: null }
}
