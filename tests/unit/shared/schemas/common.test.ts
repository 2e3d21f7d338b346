import { expect, test } from 'vitest'
import { calibrationNumberSchema, idSchema, nameFrom, nameSchema, textSchema } from '../../../../shared/schemas/common'

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

test.each([
  ['a line break', 'Ada\nBo'],
  ['a tabulator', 'Ada\tBo'],
  ['a separator of lines', 'Ada\u2028Bo'],
  ['an override of the direction of writing', 'Ada \u202eoB'],
  ['an isolate that is left open', 'Ada \u2067Bo'],
  ['nothing that can be seen', '\u200b\u00ad'],
])('a name with %s is refused', (_what, text) => {
  expect(accepts(nameSchema, text)).toBe(false)
})

test('names from right to left, with marks of their own and joined signs, are taken; text may have lines', () => {
  for (const name of ['שרה כהן', 'می\u200cخواهم', '\u200fا.\u200f', '👩\u200d🚀', 'a b'])
    expect(accepts(nameSchema, name)).toBe(true)
  expect(accepts(textSchema(10), 'a\nb')).toBe(true)
})

test.each([
  [' berths ', 'berths'],
  ['a\u202ecsv\n', 'acsv'],
  [`${'a'.repeat(119)}😀`, 'a'.repeat(119)],
  ['\u200b', ''],
])('a name is made of %j', (text, name) => {
  expect(nameFrom(text)).toBe(name)
  if (name) expect(nameSchema.parse(name)).toBe(name)
})

test('an id holds nothing that a query could stumble over', () => {
  expect(accepts(idSchema, '5e9dcbdd-8005-4971-bb06-dc071886d831')).toBe(true)
  for (const bad of ['', '\0', 'a b', "x'", 'a'.repeat(65)]) expect(accepts(idSchema, bad)).toBe(false)
})

test('calibration numbers stay within 32-bit integers', () => {
  expect(accepts(calibrationNumberSchema, 2 ** 31 - 1)).toBe(true)
  for (const bad of [0, 1.5, 2 ** 31, 1e20]) expect(accepts(calibrationNumberSchema, bad)).toBe(false)
})
