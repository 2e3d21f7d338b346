import { gunzipSync, gzipSync, deflateRawSync, constants } from 'node:zlib'
import { describe, expect, it } from 'vitest'
import { gunzip, gzip, isGzip, isZip, readZip, writeZip } from '../../../../shared/engine/formats/archive'
import { ARCHIVE_LIMITS } from '../../../../shared/engine/formats/archive-limits'
import { crc32 } from '../../../../shared/engine/formats/checksum'
import { collected } from '../../../../shared/engine/formats/chunks'
import { ReadingFault } from '../../../../shared/engine/formats/format'
import { createRandom } from '../../../../shared/engine/random'

const utf8 = (text: string): Uint8Array => new TextEncoder().encode(text)

/** Bytes that pack neither very well nor very badly. */
function someBytes(length: number, seed: number): Uint8Array {
  const random = createRandom(seed)
  return Uint8Array.from({ length }, () => 97 + Math.floor(8 * random.float() * random.float()))
}

function* cut(bytes: Uint8Array, size: number): Generator<Uint8Array> {
  for (let p = 0; p < bytes.length; p += size) yield bytes.subarray(p, p + size)
}

const opened = (bytes: Uint8Array, size = bytes.length, limits = ARCHIVE_LIMITS): Buffer =>
  Buffer.from(collected(gunzip(cut(bytes, Math.max(1, size)), limits)))

describe('gunzip', () => {
  const text = someBytes(50_000, 1)

  it('opens what zlib packed at every level, wherever the chunks are cut', () => {
    for (let level = 0; level <= 9; level++) {
      const packed = gzipSync(text, { level })
      for (const size of [packed.length, 32_768, 1000, 7]) expect(opened(packed, size).equals(text)).toBe(true)
    }
    expect(opened(gzipSync(text), 1).equals(text)).toBe(true)
    expect(opened(gzipSync(text, { strategy: constants.Z_FIXED })).equals(text)).toBe(true)
    expect(opened(gzipSync(''))).toHaveLength(0)
  })

  it('opens several members one after the other, empty ones too', () => {
    const parts = [someBytes(70_000, 2), utf8(''), someBytes(10, 3), someBytes(40_000, 4)]
    const packed = Buffer.concat(parts.map((part) => gzipSync(part)))
    for (const size of [packed.length, 1000, 1]) expect(opened(packed, size).equals(Buffer.concat(parts))).toBe(true)
  })

  it('passes over a name, a comment and an extra field in the header', () => {
    const plain = gzipSync(text)
    const header = Buffer.from([0x1f, 0x8b, 8, 4 + 8 + 16, 0, 0, 0, 0, 0, 3, 3, 0, 1, 2, 3])
    const packed = Buffer.concat([header, utf8('crews.csv\0'), utf8('for the winter\0'), plain.subarray(10)])
    for (const size of [packed.length, 1]) expect(opened(packed, size).equals(text)).toBe(true)
  })

  it('refuses a file that is cut short anywhere', () => {
    const packed = gzipSync(someBytes(300, 5))
    for (let length = 0; length < packed.length; length++) {
      expect(() => opened(packed.subarray(0, length), length), `${length} bytes`).toThrow(ReadingFault)
      expect(() => opened(packed.subarray(0, length), 5), `${length} bytes`).toThrow(ReadingFault)
    }
  })

  it('refuses a file with any byte of its data or trailer changed', () => {
    const packed = gzipSync(someBytes(300, 6))
    for (let p = 10; p < packed.length; p++) {
      const damaged = Uint8Array.from(packed)
      damaged[p]! ^= 0x55
      expect(() => opened(damaged), `byte ${p}`).toThrow(ReadingFault)
    }
  })

  it('refuses bytes that follow the file', () => {
    expect(() => opened(Buffer.concat([gzipSync(text), utf8('more')]))).toThrow(ReadingFault)
  })

  it('refuses what grows too large, before it is all there', () => {
    const bomb = gzipSync(new Uint8Array(2_000_000))
    const taken: number[] = []
    const take = (limits: typeof ARCHIVE_LIMITS): void => {
      for (const chunk of gunzip([bomb], limits)) taken.push(chunk.length)
    }
    expect(() => take({ maxBytes: 1_000_000, maxRatio: 1e9, freeBytes: 0 })).toThrow('larger than the 0 MiB')
    expect(() => take({ maxBytes: 1e9, maxRatio: 200, freeBytes: 100_000 })).toThrow('more than 200 times')
    expect(taken.reduce((sum, length) => sum + length, 0)).toBeLessThanOrEqual(1_000_000)
    expect(opened(bomb, bomb.length, { maxBytes: 1e9, maxRatio: 200, freeBytes: 2_000_000 })).toHaveLength(2_000_000)
  })

  it('refuses headers without end and files of very many members', () => {
    const endless = new Uint8Array(400_000).fill(65)
    endless.set([0x1f, 0x8b, 8, 8, 0, 0, 0, 0, 0, 3])
    expect(() => opened(endless, 30_000)).toThrow('its header is too long')
    const empty = gzipSync('')
    expect(() => opened(Buffer.concat(Array.from({ length: 10_001 }, () => empty)))).toThrow('more than 10000 parts')
  })
})

describe('gzip', () => {
  it('makes the same file of the same bytes, which zlib opens', () => {
    const text = someBytes(20_000, 7)
    expect(gunzipSync(gzip(text)).equals(text)).toBe(true)
    expect(gzip(text)).toEqual(gzip(text))
    expect(isGzip(gzip(text))).toBe(true)
    expect(isGzip(text)).toBe(false)
  })
})

const every = (): boolean => true

describe('ZIP archives', () => {
  const contents = new Map([
    ['data.npy', someBytes(5000, 8)],
    ['indices.npy', someBytes(70, 9)],
    ['empty', new Uint8Array(0)],
  ])
  const archive = writeZip(contents)

  it('read back as written, and are the same file each time', () => {
    expect(readZip(archive, every)).toEqual(contents)
    expect(writeZip(contents)).toEqual(archive)
    expect(isZip(archive)).toBe(true)
  })

  it('give only what is wanted', () => {
    expect([...readZip(archive, (name) => name === 'indices.npy').keys()]).toEqual(['indices.npy'])
  })

  /** The place of the directory's entry for a name. */
  const entryAt = (bytes: Uint8Array, name: string): number => Buffer.from(bytes).lastIndexOf(name) - 46
  const changed = (change: (bytes: Uint8Array) => void): Uint8Array => {
    const copy = archive.slice()
    change(copy)
    return copy
  }

  it('are refused when encrypted, packed another way, or ZIP64', () => {
    const at = entryAt(archive, 'data.npy')
    const encrypted = changed((bytes) => (bytes[at + 8]! |= 1))
    expect(() => readZip(encrypted, every)).toThrow('"data.npy" in the archive is encrypted')
    expect(readZip(encrypted, (name) => name === 'empty').size).toBe(1)
    expect(() =>
      readZip(
        changed((bytes) => (bytes[at + 10] = 14)),
        every,
      ),
    ).toThrow('packed by method 14')
    expect(() =>
      readZip(
        changed((bytes) => bytes.fill(255, at + 24, at + 28)),
        every,
      ),
    ).toThrow('ZIP64')
    expect(() =>
      readZip(
        changed((bytes) => bytes.fill(255, bytes.length - 12, bytes.length - 10)),
        every,
      ),
    ).toThrow('ZIP64')
  })

  it('are refused when a size or a checksum lies', () => {
    const at = entryAt(archive, 'data.npy')
    for (const field of [16, 24])
      expect(() =>
        readZip(
          changed((bytes) => (bytes[at + field]! ^= 1)),
          every,
        ),
      ).toThrow('is damaged')
    expect(() =>
      readZip(
        changed((bytes) => (bytes[at + 45] = 9)),
        every,
      ),
    ).toThrow('is not where the directory says')
  })

  it('are refused when a name stands in them twice', () => {
    const other = writeZip(new Map([...contents].map(([name, bytes]) => [name === 'empty' ? 'datb.npy' : name, bytes])))
    const twice = Buffer.from(Buffer.from(other).toString('latin1').replaceAll('datb.npy', 'data.npy'), 'latin1')
    expect(() => readZip(twice, every)).toThrow('"data.npy" in the archive stands in it twice')
  })

  it('are refused when they would grow too large, before memory is taken', () => {
    expect(() => readZip(archive, every, { ...ARCHIVE_LIMITS, maxBytes: 4000 })).toThrow('larger than')
    const huge = changed((bytes) => bytes.fill(0x7f, entryAt(bytes, 'data.npy') + 24, entryAt(bytes, 'data.npy') + 28))
    expect(() => readZip(huge, every)).toThrow('larger than the 512 MiB')
  })

  it('are refused wherever they are cut', () => {
    for (let length = 0; length < archive.length; length++)
      expect(() => readZip(archive.subarray(0, length), every), `${length} bytes`).toThrow(ReadingFault)
  })

  it('hold entries as other programs pack them', () => {
    const packed = deflateRawSync(contents.get('data.npy')!)
    const local = new DataView(new ArrayBuffer(30))
    local.setUint32(0, 0x04034b50, true)
    local.setUint16(26, 1, true)
    local.setUint16(28, 4, true)
    const entry = new DataView(new ArrayBuffer(46))
    entry.setUint32(0, 0x02014b50, true)
    entry.setUint16(10, 8, true)
    entry.setUint32(16, crc32(contents.get('data.npy')!), true)
    entry.setUint32(20, packed.length, true)
    entry.setUint32(24, 5000, true)
    entry.setUint16(28, 1, true)
    const end = new DataView(new ArrayBuffer(22))
    end.setUint32(0, 0x06054b50, true)
    end.setUint16(10, 1, true)
    end.setUint32(16, 30 + 1 + 4 + packed.length, true)
    end.setUint16(20, 7, true)
    const bytes = [local, 'd', 'xtra', packed, entry, 'd', end, 'comment'].map((part) =>
      typeof part === 'string' ? utf8(part) : part instanceof DataView ? new Uint8Array(part.buffer) : part,
    )
    expect(readZip(Buffer.concat(bytes), every).get('d')).toEqual(contents.get('data.npy'))
  })
})
