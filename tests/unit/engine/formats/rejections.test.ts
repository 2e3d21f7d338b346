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

test('all are listed as CSV, quotes doubled', () => {
  const rejections = new Rejections()
  expect(rejections.list()).toBe('')
  rejections.add('a "b", 1', 0, 8, 7, 'because, "so"')
  expect(rejections.list()).toBe('line,reason,text\r\n7,"because, ""so""","a ""b"", 1"\r\n')
})

test('a list that is cut says how many lines are missing', () => {
  const rejections = new Rejections()
  for (let line = 1; line <= 100_003; line++) rejections.add('x', 0, 1, line, 'y')
  const rows = rejections.list().trimEnd().split('\r\n')
  expect(rejections).toMatchObject({ count: 100_003, listed: 100_000 })
  expect(rows).toHaveLength(100_002)
  expect(rows.at(-1)).toBe(',"3 more lines were rejected and are not listed",')
})
