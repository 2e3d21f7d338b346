import { describe, expect, it } from 'vitest'
import type { MailView } from '../../../../shared/schemas/mail'
import { linkedText, mailStanding } from '../../../../utils/team/outbox'

const mail = (change: Partial<MailView>): MailView => ({
  id: 'm',
  to: { name: 'Ida', address: 'ida@works.example.org' },
  kind: 'embedding broken',
  subject: 'Broken',
  text: '',
  state: 'waiting',
  attempts: 0,
  nextAttemptAt: '2026-12-03T14:21:00.000Z',
  reason: null,
  createdAt: '2026-12-03T14:20:00.000Z',
  sentAt: null,
  ...change,
})

describe('mailStanding', () => {
  it('says what became of a message', () => {
    expect(mailStanding(mail({}))).toBe('About to be sent.')
    expect(mailStanding(mail({ attempts: 2, reason: '451 not now' }))).toBe(
      'Tried 2 times; next 3 Dec, 14:21. The last one: 451 not now',
    )
    expect(mailStanding(mail({ state: 'sent', attempts: 1, sentAt: '2026-12-03T14:20:02.000Z' }))).toBe(
      'Taken for delivery 3 Dec, 14:20, at attempt 1.',
    )
    expect(mailStanding(mail({ state: 'given up', attempts: 1, reason: '550 nobody' }))).toBe(
      'Given up after 1 attempt. The last one: 550 nobody',
    )
    expect(mailStanding(mail({ state: 'kept' }))).toMatch(/no mail server/)
  })
})

describe('linkedText', () => {
  it('makes links of the pages of the product, and of nothing else', () => {
    const text =
      'Open:\nhttps://plan.example/x/machines/alder-1#broken\nor https://evil.example/machines/a/b and /embeddings/1'
    const pieces = linkedText(text)
    expect(pieces.map((piece) => piece.text).join('')).toBe(text)
    expect(pieces.flatMap(({ to }) => to ?? [])).toEqual(['/machines/alder-1#broken'])
  })
})
