import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { answerCsv, answerPage, revokeAnswer, shareAnswer, sharedAnswer } from '../../server/services/answer-sheets'
import { answerView } from '../../server/services/answer-view'
import { startEmbedding } from '../../server/services/embeddings'
import { putGroups } from '../../server/services/problem-groups'
import { startRehearsal } from '../../server/services/rehearsals'
import { createRunSheet } from '../../server/services/run-sheets'
import { shareAnswerSchema } from '../../shared/schemas/answers'
import { createEmbeddingSchema } from '../../shared/schemas/embeddings'
import { saveGroupsSchema } from '../../shared/schemas/groups'
import { createRunSheetSchema, rehearseSchema } from '../../shared/schemas/run-sheets'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

/*
 * The Petersen graph in three colours: its chromatic number is 3 (Petersen, Acta Math. 15:193, 1891; Holton & Sheehan, The
 * Petersen Graph, 1993). One variable a node and colour, one group a node; a node with two colours costs 4, an edge of one
 * colour 2.
 */
const COLOURS = ['red', 'green', 'blue']
const EDGES = Array.from({ length: 5 }, (_, i): [number, number][] => [
  [i, (i + 1) % 5],
  [i, i + 5],
  [i + 5, 5 + ((i + 2) % 5)],
]).flat()
const name = (node: number, colour: string): string => `n${node} ${colour}`

function colouring(): string {
  const lines: string[] = ['# offset: 20']
  const row = (a: string, b: string, value: number): number => lines.push(`"${a}","${b}",${value}`)
  for (let node = 0; node < 10; node++)
    COLOURS.forEach((colour, c) => {
      // 2·(1 − Σx)² = 2 − 2·Σx + 4·Σxx
      row(name(node, colour), name(node, colour), -2)
      COLOURS.slice(c + 1).forEach((other) => row(name(node, colour), name(node, other), 4))
    })
  for (const [a, b] of EDGES) COLOURS.forEach((colour) => row(name(a, colour), name(b, colour), 2))
  return lines.join('\n')
}

let test: TestApp
let returnId: string
beforeAll(async () => {
  test = await startTestApp(2)
  const { app, actor } = test
  const problemId = await test.problem(colouring())
  const groups = Array.from({ length: 10 }, (_, node) => ({
    name: `node ${node}`,
    kind: 'exactly',
    k: 1,
    members: COLOURS.map((colour) => name(node, colour)),
  }))
  await putGroups(app, actor, problemId, saveGroupsSchema.parse({ groups }))
  const machineId = await test.machine({ kind: 'pegasus', m: 4 })
  const search = createEmbeddingSchema.parse({ problemId, machineId, seed: 1, tries: 2, timeLimitSeconds: 30 })
  const { id: embeddingId, jobId } = await startEmbedding(app, actor, search)
  await test.finished(jobId)
  const sheet = await createRunSheet(app, actor, createRunSheetSchema.parse({ embeddingId, reads: 200 }))
  const rehearsal = await startRehearsal(app, actor, sheet.id, rehearseSchema.parse({ reads: 200, sweeps: 1000 }))
  await test.finished(rehearsal.jobId)
  returnId = rehearsal.returnId
})
afterAll(() => test.close())

const asked = { decode: 'descent', assignments: 3 } as const

describe('an answer sheet', () => {
  it('holds a colouring of the Petersen graph without a violation, checked against the graph', async () => {
    const answer = await answerView(test.app, test.actor, returnId, asked)
    const [best] = answer.assignments
    expect(best).toMatchObject({ energy: 0, broken: [], violated: 0 })
    const coloursOf = (node: number): string[] => COLOURS.filter((colour) => best!.assignment[name(node, colour)] === 1)
    for (let node = 0; node < 10; node++) expect(coloursOf(node)).toHaveLength(1)
    for (const [a, b] of EDGES) expect(coloursOf(a)[0]).not.toBe(coloursOf(b)[0])
    expect(answer.groups).toHaveLength(10)
    expect(answer.groups.every(({ kept, atOne }) => kept[0] && atOne[0] === 1)).toBe(true)
    expect(answer.source).toBe('rehearsal')
  })

  it('is read by whoever holds the link, as it was set when the link was made, until it is taken back', async () => {
    const { app, actor } = test
    const input = shareAnswerSchema.parse({ decode: 'descent', assignments: 2, remark: 'For the office.' })
    const { url } = await shareAnswer(app, actor, returnId, input)
    const secret = url.replace('/answers/', '')
    const shared = await sharedAnswer(app, secret)
    expect(shared).toMatchObject({ by: 'Developer', remark: 'For the office.', answer: { decode: 'descent' } })
    expect(shared.answer.assignments.length).toBeLessThanOrEqual(2)
    expect(answerCsv(shared.answer).split('\n')[0]).toMatch(/^energy,count,distance,n0 red,/)
    expect((await answerPage(app, actor, returnId, asked)).links).toMatchObject([{ assignments: 2, decode: 'descent' }])

    // The database alone opens nothing.
    const rows = await app.db.query.answerSheets.findMany()
    expect(JSON.stringify(rows)).not.toContain(secret)
    await expect(sharedAnswer(app, rows[0]!.tokenHash)).rejects.toThrow(/no answer under this link/)

    expect(await revokeAnswer(app, actor, returnId)).toEqual({ revoked: 1 })
    await expect(sharedAnswer(app, secret)).rejects.toThrow(/no answer under this link/)
    expect((await answerPage(app, actor, returnId, asked)).links).toEqual([])
  })

  it('is another workspace’s secret', async () => {
    const stranger = { userId: test.actor.userId, workspaceId: 'elsewhere' }
    await expect(answerPage(test.app, stranger, returnId, asked)).rejects.toThrow(/no such samples/)
    await expect(shareAnswer(test.app, stranger, returnId, shareAnswerSchema.parse({}))).rejects.toThrow(
      /no such samples/,
    )
    await expect(revokeAnswer(test.app, stranger, returnId)).rejects.toThrow(/no such samples/)
  })
})
