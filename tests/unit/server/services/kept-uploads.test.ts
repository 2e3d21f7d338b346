import { beforeEach, describe, expect, it } from 'vitest'
import { KeptUploads } from '../../../../server/services/kept-uploads'
import type { ReadUpload } from '../../../../server/services/problem-upload'

const ana = { userId: 'ana', workspaceId: 'w' }
const ben = { userId: 'ben', workspaceId: 'w' }
const MEBIBYTE = 2 ** 20
const fileOf = (mebibytes: number, name = 'a.csv') => ({ name, bytes: new Uint8Array(mebibytes * MEBIBYTE) })
const upload = { data: { problem: { n: 1, values: new Float64Array(1) } } } as ReadUpload

let now: Date
let uploads: KeptUploads
beforeEach(() => {
  now = new Date('2026-12-01T12:00:00Z')
  uploads = new KeptUploads(() => now)
})

describe('files that were looked at', () => {
  it('are found again by the one who sent them, with what was read by the same options', () => {
    const file = fileOf(1)
    const id = uploads.keep(ana, file, 'as qubo', upload)!
    expect(uploads.file(ana, id)).toBe(file)
    expect(uploads.reading(file, 'as qubo')).toBe(upload)
    expect(uploads.reading(file, 'as ising')).toBeUndefined()
    expect(uploads.reading(fileOf(1), 'as qubo')).toBeUndefined()
  })

  it('are nobody else’s, in no other workspace', () => {
    const id = uploads.keep(ana, fileOf(1), '', upload)!
    for (const actor of [ben, { ...ana, workspaceId: 'other' }])
      expect(() => uploads.file(actor, id)).toThrow('The file is no longer kept here. Send it again.')
  })

  it('are forgotten after ten minutes', () => {
    const file = fileOf(1)
    const id = uploads.keep(ana, file, '', upload)!
    now = new Date(now.getTime() + 599_000)
    expect(uploads.file(ana, id)).toBe(file)
    now = new Date(now.getTime() + 1000)
    expect(() => uploads.file(ana, id)).toThrow('Send it again')
    expect(uploads.reading(file, '')).toBeUndefined()
  })

  it('give way to the next one of the same person', () => {
    const first = uploads.keep(ana, fileOf(1), '', upload)!
    const other = uploads.keep(ben, fileOf(1), '', upload)!
    uploads.keep(ana, fileOf(1), '', upload)
    expect(() => uploads.file(ana, first)).toThrow()
    expect(() => uploads.file(ben, other)).not.toThrow()
  })

  it('give way, the oldest first, when they become too many', () => {
    const people = Array.from({ length: 5 }, (_, k) => ({ userId: `u${k}`, workspaceId: 'w' }))
    const ids = people.map((actor) => uploads.keep(actor, fileOf(60), '', upload)!)
    const isKept = people.map((actor, k) => {
      try {
        return uploads.file(actor, ids[k]!) !== undefined
      } catch {
        return false
      }
    })
    expect(isKept).toEqual([false, true, true, true, true])
  })

  it('are not kept when they are sent again sooner, or are too large', () => {
    expect(uploads.keep(ana, { name: 'a', bytes: new Uint8Array(1000) }, '', upload)).toBeNull()
    expect(uploads.keep(ana, fileOf(257), '', upload)).toBeNull()
  })
})
