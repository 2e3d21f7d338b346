import { expect, test } from 'vitest'
import { Rejections } from '../../../../shared/engine/formats/rejections'

test('a cut through a character leaves no half of it behind', () => {
  const text = `${'x'.repeat(199)}😀 tail`
  const rejections = new Rejections()
  rejections.add(text, 0, text.length, 1, 'because')
  expect(rejections.lines[0]!.text).toBe(`${'x'.repeat(199)}\uFFFD…`)
  expect(rejections.lines[0]!.text.isWellFormed()).toBe(true)
})

test('U+0000 is replaced in the text and in the reason', () => {
  const rejections = new Rejections()
  rejections.add('a\0b', 0, 3, 1, 'the value "\0\ud83d" is wrong')
  expect(rejections.lines).toEqual([{ line: 1, text: 'a\uFFFDb', reason: 'the value "\uFFFD\uFFFD" is wrong' }])
})
