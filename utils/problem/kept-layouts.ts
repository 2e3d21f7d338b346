/** Positions of a problem's variables as a browser keeps them. */
export interface KeptLayout {
  /** Of the problem's content: another one makes the positions void. */
  readonly fingerprint: string
  readonly seed: number
  readonly made: number
  readonly settled: boolean
  readonly positions: Float32Array
}

export type KeptStorage = Pick<Storage, 'getItem' | 'setItem' | 'removeItem'>

export const KEPT_DEFAULTS = {
  prefix: 'espalier.problem-graph.',
  /** Problems kept, newest first; older ones are forgotten. */
  most: 40,
}

const INDEX = `${KEPT_DEFAULTS.prefix}index`
const keyOf = (problemId: string) => KEPT_DEFAULTS.prefix + problemId
/** Places on either axis: fine enough for any screen, and two bytes each. */
const PLACES = 65_535

/** Keeps the layout of a problem. Where the browser offers no room, nothing is kept and nothing is said. */
export function keepLayout(storage: KeptStorage, problemId: string, layout: KeptLayout): void {
  const { fingerprint, seed, made, settled, positions } = layout
  const box = boxOf(positions)
  const record = { fingerprint, seed, made, settled, box, places: toBase64(quantised(positions, box)) }
  const ids = [problemId, ...indexOf(storage).filter((id) => id !== problemId)]
  try {
    for (const old of ids.slice(KEPT_DEFAULTS.most)) storage.removeItem(keyOf(old))
    storage.setItem(keyOf(problemId), JSON.stringify(record))
    storage.setItem(INDEX, JSON.stringify(ids.slice(0, KEPT_DEFAULTS.most)))
  } catch {
    storage.removeItem(keyOf(problemId))
  }
}

/** The layout kept of a problem; null where there is none, or none of this content. */
export function keptLayout(
  storage: KeptStorage,
  problemId: string,
  { fingerprint, variables }: { fingerprint: string; variables: number },
): KeptLayout | null {
  try {
    const record = JSON.parse(storage.getItem(keyOf(problemId)) ?? 'null') as Record<string, unknown> | null
    if (record?.fingerprint !== fingerprint) return null
    const { seed, made, settled, box, places } = record as {
      seed: number
      made: number
      settled: boolean
      box: { x: number; y: number; extent: number }
      places: string
    }
    const found = fromBase64(places)
    if (found.length !== 2 * variables || !(box.extent > 0)) return null
    const positions = Float32Array.from(found, (place, k) => (k % 2 ? box.y : box.x) + (place / PLACES) * box.extent)
    return { fingerprint, seed, made, settled, positions }
  } catch {
    return null
  }
}

function indexOf(storage: KeptStorage): string[] {
  try {
    const ids: unknown = JSON.parse(storage.getItem(INDEX) ?? '[]')
    return Array.isArray(ids) ? ids.filter((id) => typeof id === 'string') : []
  } catch {
    return []
  }
}

function boxOf(positions: Float32Array): { x: number; y: number; extent: number } {
  const ends = [Infinity, Infinity, -Infinity, -Infinity]
  positions.forEach((place, k) => {
    ends[k % 2] = Math.min(ends[k % 2]!, place)
    ends[2 + (k % 2)] = Math.max(ends[2 + (k % 2)]!, place)
  })
  const extent = Math.max(ends[2]! - ends[0]!, ends[3]! - ends[1]!)
  return extent > 0 ? { x: ends[0]!, y: ends[1]!, extent } : { x: positions[0] ?? 0, y: positions[1] ?? 0, extent: 1 }
}

const quantised = (positions: Float32Array, { x, y, extent }: { x: number; y: number; extent: number }): Uint16Array =>
  Uint16Array.from(positions, (place, k) => Math.round(((place - (k % 2 ? y : x)) / extent) * PLACES))

function toBase64(places: Uint16Array): string {
  const bytes = new Uint8Array(2 * places.length)
  const view = new DataView(bytes.buffer)
  places.forEach((place, k) => view.setUint16(2 * k, place, true))
  return btoa(Array.from(bytes, (byte) => String.fromCharCode(byte)).join(''))
}

function fromBase64(text: string): Uint16Array {
  const bytes = Uint8Array.from(atob(text), (character) => character.charCodeAt(0))
  const view = new DataView(bytes.buffer)
  return Uint16Array.from({ length: bytes.length >> 1 }, (_, k) => view.getUint16(2 * k, true))
}
