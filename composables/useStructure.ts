import { unpackArrays } from '#shared/packed-arrays'
import type { StructureDetailsView } from '#shared/schemas/structure'
import type { SparsityPicture } from '~/utils/problem/sparsity'

const queryOf = (parts: Record<string, string | number | undefined>): string => {
  const given = Object.entries(parts).filter(([, value]) => value !== undefined)
  return new URLSearchParams(given.map(([name, value]) => [name, String(value)])).toString()
}

/** The slower part of a problem's structure report. */
export const useStructureDetails = (id: () => string, version: () => number | undefined) =>
  useLateLoad(() => $fetch<StructureDetailsView>(`/api/problems/${id()}/structure?${queryOf({ version: version() })}`))

/** The pattern of a problem's interactions, in one of its orders. */
export const useSparsity = (id: () => string, version: () => number | undefined, order: () => string) =>
  useLateLoad(async () => {
    const address = `/api/problems/${id()}/sparsity?${queryOf({ order: order(), version: version() })}`
    const bytes = await $fetch<ArrayBuffer>(address, { responseType: 'arrayBuffer' })
    const { meta, arrays } = unpackArrays(new Uint8Array(bytes))
    return markRaw({ ...arrays, ...meta } as unknown as SparsityPicture)
  })
