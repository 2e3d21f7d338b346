import { expect, test } from 'vitest'
import { calibrationNumberSchema, idSchema, nameSchema, textSchema } from '../../../../shared/schemas/common'

const accepts = (schema: { safeParse(input: unknown): { success: boolean } }, input: unknown): boolean =>
  schema.safeParse(input).success

test.each([
  ['U+0000', 'a\0b'],
  ['the first half of a surrogate pair', 'a\ud83d'],
  ['the second half', '\ude00b'],
])('text with %s is refused: the database could not store it', (_what, text) => {
  expect(accepts(nameSchema, text)).toBe(false)
  expect(accepts(textSchema(10), text)).toBe(false)
})

test('whole characters of every plane are taken', () => {
  expect(nameSchema.parse(' Kai 😀 ')).toBe('Kai 😀')
  expect(textSchema(10).parse('')).toBe('')
})

test('an id holds nothing that a query could stumble over', () => {
  expect(accepts(idSchema, '5e9dcbdd-8005-4971-bb06-dc071886d831')).toBe(true)
  for (const bad of ['', '\0', 'a b', "x'", 'a'.repeat(65)]) expect(accepts(idSchema, bad)).toBe(false)
})

test('calibration numbers stay within 32-bit integers', () => {
  expect(accepts(calibrationNumberSchema, 2 ** 31 - 1)).toBe(true)
  for (const bad of [0, 1.5, 2 ** 31, 1e20]) expect(accepts(calibrationNumberSchema, bad)).toBe(false)
})
