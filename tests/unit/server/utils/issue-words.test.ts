import { describe, expect, it } from 'vitest'
import { z } from 'zod'
import { issueWords } from '../../../../server/utils/issue-words'

const told = (schema: z.ZodType, input: unknown) =>
  schema.safeParse(input, { error: issueWords }).error?.issues.map((issue) => issue.message)

describe('the words for what cannot be accepted', () => {
  it.each([
    [z.string().max(5), 'abcdef', 'at most 5 characters'],
    [z.string().min(2), 'a', 'at least 2 characters'],
    [z.array(z.number()).max(1), [1, 2], 'at most 1 entry'],
    [z.number().min(1), 0, 'at least 1'],
    [z.number().max(200), 201, 'at most 200'],
    [z.number().gt(0), 0, 'more than 0'],
    [z.number().lt(9), 9, 'less than 9'],
    [z.number().int(), 1.5, 'give a whole number'],
    [z.number(), 'x', 'give a number'],
    [z.coerce.number(), 'x', 'give a number'],
    [z.number(), Infinity, 'give a number'],
    [z.number(), undefined, 'is missing: give a number'],
    [z.string(), 5, 'give text'],
    [z.object({}), [], 'give an object'],
    [z.array(z.string()), 'x', 'give a list'],
    [z.boolean(), 'x', 'give true or false'],
    [z.enum(['a', 'b', 'c']), 'd', 'give a, b or c'],
    [z.literal('a'), 'd', 'give a'],
    [z.strictObject({ a: z.number() }), { a: 1, b: 2 }, 'knows no b'],
    [
      z.discriminatedUnion('kind', [z.object({ kind: z.literal('x') }), z.object({ kind: z.literal('y') })]),
      { kind: 'z' },
      'give x or y',
    ],
  ])('says in plain words what is wrong: %#', (schema, input, words) => {
    expect(told(schema, input)).toEqual([words])
  })

  it('leaves words that a schema brings', () => {
    expect(told(z.string().max(5, 'at most five'), 'abcdef')).toEqual(['at most five'])
  })
})
