import { expect, it } from 'vitest'
import type { NewsItem } from '../../../../shared/schemas/news'
import { newsByDay } from '../../../../utils/news/days'

const written = (at: string): NewsItem => ({ at }) as NewsItem

it('puts items of one day of UTC together, in their order', () => {
  const times = [
    '2026-12-03T00:00:00.000Z',
    '2026-12-02T23:59:59.999Z',
    '2026-12-02T08:00:00.000Z',
    '2025-12-02T08:00:00.000Z',
  ]
  expect(newsByDay(times.map(written)).map(({ day, items }) => [day, items.length])).toEqual([
    ['2026-12-03', 1],
    ['2026-12-02', 2],
    ['2025-12-02', 1],
  ])
  expect(newsByDay([])).toEqual([])
})
