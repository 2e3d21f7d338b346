import type { ActivityView } from '#shared/schemas/activity'

const PER_PAGE = 10

/** What happened to a problem or a run sheet, newest first; asked for in the browser, as it stands below all else. */
export function useActivity(path: MaybeRefOrGetter<string>) {
  const addressOf = (more = ''): string => `/api/${toValue(path)}/activity?limit=${PER_PAGE}${more}`
  const first = useLateLoad(() => $fetch<ActivityView>(addressOf()))
  const pages = useLaterPages(first.data, (cursor) => addressOf(`&cursor=${encodeURIComponent(cursor)}`))
  return { ...first, ...pages }
}
