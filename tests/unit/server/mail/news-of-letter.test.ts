import { expect, it } from 'vitest'
import type { Letter } from '../../../../server/mail/letter'
import { brokenLetter, handedOverLetter } from '../../../../server/mail/letters'
import { newsOfLetter } from '../../../../server/mail/news-of-letter'

const sheet = { id: 'rs', number: 4, name: 'Berths', problem: 'Berths of May', machine: 'Alder' }
const letter = (change: Partial<Letter>): Letter => ({
  ...handedOverLetter(sheet, 'sent back', 'Maud', 'Fewer reads.', 'preparer'),
  ...change,
})

it('says what was done in a sentence, with the words of whoever did it', () => {
  expect(newsOfLetter(letter({}))).toEqual({
    title: 'RS-4 was sent back: Berths',
    text: 'RS-4, Berths, runs Berths of May on Alder. Maud sent it back.',
    quote: 'Fewer reads.',
    path: '/run-sheets/rs',
  })
})

it('lists what the first words are about, the first few by name', () => {
  const broken = (many: number) =>
    newsOfLetter(
      brokenLetter(
        { id: 'm', name: 'Alder', calibration: 3 },
        'Per',
        '',
        Array.from({ length: many }, (_, k) => ({
          embedding: { id: `e${k}`, number: k + 1 },
          problem: 'Berths',
          damage: { chains: 1, ofChains: 4, qubitsLost: [1], couplersLost: [], total: 1 } as never,
          runSheets: [],
        })),
      ),
    ).text
  expect(broken(1)).toMatch(/no longer holds: E-1 of Berths\.$/)
  expect(broken(7)).toMatch(/: E-1 of Berths; .*; E-5 of Berths; and 2 more\.$/)
})

it('keeps nothing that cannot be seen, no line end in a title, and no endless quote', () => {
  const { title, text, quote } = newsOfLetter(
    letter({ subject: 'a\u202E\nb', parts: [{ text: 'c\u2028d\ne' }, { quote: '\u{1F6A2}'.repeat(900) }] }),
  )
  expect([title, text]).toEqual(['a b', 'c d\ne'])
  expect([...quote!]).toHaveLength(400)
  expect(quote!.endsWith('\u{1F6A2}…')).toBe(true)
  expect(newsOfLetter(letter({ parts: [] }))).toMatchObject({ text: '', quote: null })
})
