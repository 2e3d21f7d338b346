import type { LibraryPage, LibrarySummary } from '#shared/schemas/library'
import type { LibraryView } from '~/utils/problem/library'
import { libraryAddress, libraryQuery, libraryView } from '~/utils/problem/library'

/** Time without typing after which the library is searched. */
const PAUSE_MILLISECONDS = 250

/**
 * The library as the address of the page says: what is sought, sorted and which page of it, so that it can be shared and
 * the way back leads through it.
 */
export async function useLibrary() {
  const route = useRoute()
  const router = useRouter()
  // On the way to another page the address no longer speaks of the library.
  const path = route.path
  const view = shallowRef(libraryView(route.query))
  watch(
    () => route.query,
    (query) => route.path === path && (view.value = libraryView(query)),
  )
  const [page, { data: summary, refresh: refreshSummary }] = await Promise.all([
    useResource<LibraryPage>(() => libraryAddress(view.value)),
    useResource<LibrarySummary>('/api/problems/summary'),
  ])
  /** The last answer stays while the next one is fetched. */
  const shown = shallowRef(page.data.value)
  watch(page.data, (next) => next && (shown.value = next))

  /** Another search or order begins at its first page. */
  const ask = (change: Partial<LibraryView>, replaces = false) => {
    const query = libraryQuery({ ...view.value, cursor: null, ...change })
    return replaces ? router.replace({ query }) : router.push({ query })
  }
  const { typed, flush } = useTypedWords(view, (q) => ask({ q }, true))

  const refresh = () => Promise.all([page.refresh(), refreshSummary()])
  return { view, shown, summary, failure: page.failure, status: page.status, typed, flush, ask, refresh }
}

/** Words as they are typed; the address follows after a pause, and they follow the address on the way back. */
function useTypedWords(view: Ref<LibraryView>, say: (words: string) => unknown) {
  const typed = ref(view.value.q)
  let timer: ReturnType<typeof setTimeout> | undefined
  const flush = (): void => {
    clearTimeout(timer)
    if (typed.value.trim() !== view.value.q) say(typed.value.trim())
  }
  watch(typed, () => {
    clearTimeout(timer)
    timer = setTimeout(flush, PAUSE_MILLISECONDS)
  })
  watch(
    () => view.value.q,
    (words) => {
      if (typed.value.trim() !== words) typed.value = words
    },
  )
  onBeforeUnmount(() => clearTimeout(timer))
  return { typed, flush }
}
