import { randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { uploadedFile, uploadProblem } from '../../server/services/problem-upload'
import { rejectedLinesIn, rejectedLinesOf } from '../../server/services/rejected-lines'
import { uploadVersion } from '../../server/services/version-upload'
import { uploadVersionSchema } from '../../shared/schemas/problem-versions'
import { uploadProblemSchema } from '../../shared/schemas/problems'
import type { TestApp } from '../support/app'
import { startTestApp } from '../support/app'

let test: TestApp
beforeAll(async () => {
  test = await startTestApp(1)
})
afterAll(() => test.close())

const fileOf = (text: string) => ({ name: 'links.txt', bytes: new TextEncoder().encode(text) })
const options = (given: Record<string, unknown>) => uploadProblemSchema.parse(given)
/** Some 300 kB: large enough to be kept. */
const large = (value: number): string =>
  Array.from({ length: 20_000 }, (_, k) => `pier${k % 400} quay${(k * 7) % 401} ${value + (k % 5)}`).join('\n')
const faulty = (wrong: number): string =>
  `pier quay 1\n${Array.from({ length: wrong }, (_, k) => `pier quay wrong"${k}`).join('\n')}\n`

describe('a large file that was looked at', () => {
  it('is saved without being sent again, as it was read', async () => {
    const { app, actor } = test
    const file = fileOf(large(1))
    const told: number[] = []
    const watch = { onProgress: (bytes: number) => told.push(bytes) }
    const looked = await uploadProblem(app, actor, file, options({ dryRun: true }), watch)
    expect(looked).toMatchObject({ id: null, kept: expect.any(String), reading: { format: 'coefficients' } })
    expect(told.every((bytes) => bytes >= 0 && bytes <= file.bytes.length)).toBe(true)
    const again = uploadedFile(app, actor, null, looked.kept!)
    expect(again).toBe(file)
    const saved = await uploadProblem(app, actor, again, options({ name: 'links' }))
    expect(saved).toMatchObject({
      id: expect.any(String),
      kept: null,
      name: 'links',
      interactions: looked.interactions,
    })
  })

  it('is read in another way without being sent again', async () => {
    const { app, actor } = test
    const { kept } = await uploadProblem(app, actor, fileOf(large(2)), options({ dryRun: true }))
    const file = uploadedFile(app, actor, null, kept!)
    const ising = await uploadProblem(app, actor, file, options({ dryRun: true, form: 'ising', sense: 'max' }))
    expect(ising).toMatchObject({ form: 'ising', sense: 'max' })
    expect(uploadedFile(app, actor, null, ising.kept!)).toBe(file)
  })

  it('has to be sent again where it is gone', () => {
    const { app, actor } = test
    expect(() => uploadedFile(app, actor, null, randomUUID())).toThrow(
      'The file is no longer kept here. Send it again.',
    )
    expect(() => uploadedFile(app, actor, null, undefined)).toThrow('The form has no file')
  })

  it('is small enough to be sent twice otherwise', async () => {
    const { app, actor } = test
    expect((await uploadProblem(app, actor, fileOf('a b 1\n'), options({ dryRun: true }))).kept).toBeNull()
  })
})

describe('rejected lines', () => {
  const rowsOf = (csv: string): string[] => csv.trimEnd().split('\r\n')

  it('can all be taken before anything is saved, even where no problem comes of the rest', async () => {
    const { app } = test
    const { name, text } = await rejectedLinesIn(app, fileOf(faulty(150)), options({}))
    expect(name).toBe('links-rejected.csv')
    expect(rowsOf(text)).toHaveLength(151)
    expect(rowsOf(text)[1]).toBe('2,"the value ""wrong""0"" is not a decimal number","pier quay wrong""0"')
    const none = await rejectedLinesIn(app, fileOf('x\ny\n'), options({ format: 'coefficients' }))
    expect(rowsOf(none.text)).toHaveLength(3)
  })

  it.each([
    ['few, from the reading', 3],
    ['many, from a list of their own', 250],
  ])('can all be taken afterwards: %s', async (_, wrong) => {
    const { app, actor } = test
    const { id, reading } = await uploadProblem(app, actor, fileOf(faulty(wrong)), options({ skipRejected: true }))
    expect(reading.rejected).toHaveLength(Math.min(wrong, 100))
    const { bytes } = await rejectedLinesOf(app, actor, id!, undefined)
    const rows = rowsOf(new TextDecoder().decode(bytes))
    expect(rows).toHaveLength(wrong + 1)
    expect(rows.at(-1)).toContain(`wrong""${wrong - 1}`)
    const stranger = { ...actor, workspaceId: actor.userId }
    await expect(rejectedLinesOf(app, stranger, id!, undefined)).rejects.toMatchObject({ kind: 'not found' })
  })

  it('are those of each version', async () => {
    const { app, actor } = test
    const { id } = await uploadProblem(app, actor, fileOf(faulty(120)), options({ skipRejected: true }))
    const next = fileOf(`pier quay 2\n${faulty(0)}x\n`)
    await uploadVersion(app, actor, id!, next, uploadVersionSchema.parse({ skipRejected: true }))
    const countOf = async (version: number) =>
      rowsOf(new TextDecoder().decode((await rejectedLinesOf(app, actor, id!, version)).bytes)).length
    expect([await countOf(1), await countOf(2)]).toEqual([121, 2])
  })
})
