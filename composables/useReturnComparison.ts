import type { ReturnComparison } from '#shared/schemas/return-comparison'
import type { Decoding } from '#shared/schemas/returns'
import { decodeSchema } from '#shared/schemas/returns'
import type { Against, Compared } from '~/utils/returns/comparison'
import { AGAINST, COMPARED } from '~/utils/returns/comparison'

const oneOf = <T extends string>(values: readonly T[], value: unknown): T =>
  values.find((known) => known === value) ?? values[0]!

/** All samples of a problem side by side, as the address says: how decoded, within which gap, what is drawn against what. */
export function useReturnComparison(problemId: string) {
  const route = useRoute()
  const router = useRouter()
  const inAddress = <T extends string | number>(name: string, read: (value: unknown) => T) =>
    computed<T>({
      get: () => read(route.query[name]),
      set: (next) => void router.replace({ query: { ...route.query, [name]: String(next) } }),
    })
  const decode = inAddress<Decoding>('decode', (value) => decodeSchema.catch('majority').parse(value))
  const gap = inAddress<number>('gap', (value) => Math.max(0, Number(value ?? 0)) || 0)
  const measure = inAddress<Compared>('measure', (value) => oneOf(COMPARED, value))
  const against = inAddress<Against>('against', (value) => oneOf(AGAINST, value))

  const url = computed(() => `/api/problems/${problemId}/returns?decode=${decode.value}&gap=${gap.value}`)
  // Worked out when first asked for: the page is there before it.
  const late = useLateLoad(() => $fetch<ReturnComparison>(url.value))
  onMounted(() => watch(url, late.load, { immediate: true }))
  const pages = useLaterPages(late.data, (cursor) => `${url.value}&cursor=${encodeURIComponent(cursor)}`)
  const csv = computed(() => `${url.value}&format=csv`)
  return { decode, gap, measure, against, ...pages, ...late, csv }
}
