import { expect, it } from 'vitest'
import { wholeList } from '../../../../utils/ui/wholeList'

/** A list of so many numbers, as routes answer it, with the addresses that were asked for. */
function served(count: number) {
  const asked: string[] = []
  const readPage = async (address: string) => {
    asked.push(address)
    const query = new URL(address, 'http://here').searchParams
    const [limit, start] = [Number(query.get('limit')), Number(query.get('cursor') ?? 0)]
    const items = Array.from({ length: Math.min(limit, count - start) }, (_, k) => start + k)
    const isLast = start + limit >= count
    return { items, nextCursor: isLast ? null : String(start + limit), calibration: 3 + asked.length }
  }
  return { asked, readPage }
}

it('follows the cursor to the end', async () => {
  const { asked, readPage } = served(450)
  const whole = await wholeList('/api/people', readPage)
  expect(whole.items).toEqual(Array.from({ length: 450 }, (_, k) => k))
  expect(whole.nextCursor).toBeNull()
  expect(asked).toEqual([
    '/api/people?limit=200',
    '/api/people?limit=200&cursor=200',
    '/api/people?limit=200&cursor=400',
  ])
})

it('asks once for what fits, after the query that is there, and keeps what the first page says', async () => {
  const { asked, readPage } = served(200)
  expect(await wholeList('/api/machines/m/use?calibration=2', readPage)).toMatchObject({ calibration: 4 })
  expect(asked).toEqual(['/api/machines/m/use?calibration=2&limit=200'])
})
