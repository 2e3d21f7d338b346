import { readFileSync } from 'node:fs'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { PROBLEM_FILE_KEYS, PROBLEM_FILES, type ProblemFileKey } from '../../shared/problem-files'
import type { ProblemView, UploadedProblem } from '../../shared/schemas/problems'
import { Client } from '../support/client'
import { emptyFolder } from '../support/folders'
import { startServer, until, type RunningServer } from '../support/server'

let server: RunningServer
let developer: Client
beforeAll(async () => {
  const NUXT_SESSION_PASSWORD = 'a-password-of-at-least-thirty-two-characters'
  server = await startServer({ NUXT_SESSION_PASSWORD, ALLOW_PLAIN_HTTP: 'true', DATA_DIR: emptyFolder() })
  const code = await until(() => /one-time code: (\S+)/.exec(server.output())?.[1], 10, 'the code')
  developer = new Client(server.url)
  const person = { workspace: 'Brackwater', name: 'Ann', email: 'ann@example.org', password: 'long enough a password' }
  expect((await developer.post('/api/setup', { ...person, code })).status).toBe(201)
})
afterAll(() => server.stop())

/** Problems as a team might have them, one for what each format leaves out. */
const PROBLEMS = {
  labelled:
    '# form: ising\n# sense: max\n# offset: -2.5\n"north berth" "north berth" 0.1\nb "north berth" -3\nb c 1e-20\nd d 0\n',
  counted: '# offset: 7\n0 0 1.5\n0 1 -2\n2 1 0.25\n3 3 0\n',
  bare: '0 0 1.5\n0 1 -2\n2 1 0.3333333333333333\n',
  cut: '# sense: max\n1 1 3\n2 2 1\n3 3 2\n1 2 -2\n1 3 -4\n',
}
type Name = keyof typeof PROBLEMS

/** What not every problem can be written as, and what can be. */
const ONLY: Partial<Record<ProblemFileKey, Name[]>> = { npy: ['bare'], cut: ['cut'] }

async function uploaded(contents: string | Uint8Array<ArrayBuffer>, fileName: string) {
  const { status, body } = await developer.upload<UploadedProblem>('/api/problems', contents, fileName)
  expect(status, JSON.stringify(body)).toBe(201)
  const { body: view } = await developer.get<ProblemView>(`/api/problems/${body.id}`)
  return view
}

describe.each(Object.keys(PROBLEMS) as Name[])('the %s problem', (name) => {
  let given: ProblemView
  let turned: ProblemView
  beforeAll(async () => {
    given = await uploaded(PROBLEMS[name], `${name}.txt`)
    const { bytes } = await developer.download(fileOf(given, { form: otherForm(), format: 'csv' }))
    turned = await uploaded(bytes, 'turned.csv')
  })

  const otherForm = () => (given.form === 'qubo' ? 'ising' : 'qubo')
  const fileOf = ({ id }: ProblemView, query: Record<string, string>) =>
    `/api/problems/${id}/coefficients?${new URLSearchParams(query)}`

  it.each(PROBLEM_FILE_KEYS)('comes back from a file as %s with an equal fingerprint', async (format) => {
    for (const form of [given.form, otherForm()])
      for (const gzip of ['0', '1']) {
        const file = await developer.download(fileOf(given, { form, format, gzip }))
        if (ONLY[format] && !(ONLY[format].includes(name) && form === given.form)) {
          expect(file.status).toBe(422)
          expect(new TextDecoder().decode(file.bytes)).toContain('This problem cannot be written as')
          continue
        }
        expect(file.status).toBe(200)
        expect(file.fileName).toBe(
          `P-${given.number}-${form}.${PROBLEM_FILES[format].ending}${gzip === '1' ? '.gz' : ''}`,
        )
        const again = await uploaded(file.bytes, 'again')
        expect(again).toMatchObject({ form, sense: given.sense, reading: { format: PROBLEM_FILES[format].format } })
        expect(again.fingerprint).toBe((form === given.form ? given : turned).fingerprint)
      }
  })

  it('comes as the type that the format has', async () => {
    const type = async (query: Record<string, string>) => (await developer.download(fileOf(given, query))).type
    expect(await type({ format: 'csv' })).toBe('text/csv; charset=utf-8')
    expect(await type({ format: 'json' })).toBe('application/json')
    expect(await type({ format: 'npz' })).toBe('application/octet-stream')
    expect(await type({ format: 'csv', gzip: '1' })).toBe('application/gzip')
  })
})

it('a format that does not exist is refused', async () => {
  const problem = await uploaded(PROBLEMS.bare, 'bare.txt')
  expect((await developer.download(`/api/problems/${problem.id}/coefficients?format=tarot`)).status).toBe(422)
})

it('the JSON Schema of problem documents is there for everybody', async () => {
  const { status, type, bytes } = await new Client(server.url).download('/api/schemas/problem.json')
  expect([status, type]).toEqual([200, 'application/schema+json; charset=utf-8'])
  const published: unknown = JSON.parse(readFileSync('docs/problem.schema.json', 'utf8'))
  expect(JSON.parse(new TextDecoder().decode(bytes))).toEqual(published)
})
