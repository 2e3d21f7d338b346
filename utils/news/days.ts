import type { NewsItem } from '#shared/schemas/news'

/** News of one day, UTC as all times are shown. */
export interface NewsDay {
  /** `2026-12-03` */
  day: string
  items: NewsItem[]
}

/** Puts items that follow each other on one day together, in their order. */
export function newsByDay(items: readonly NewsItem[]): NewsDay[] {
  const days: NewsDay[] = []
  for (const item of items) {
    const day = item.at.slice(0, 10)
    const last = days.at(-1)
    if (last?.day === day) last.items.push(item)
    else days.push({ day, items: [item] })
  }
  return days
}
