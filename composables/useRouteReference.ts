import type { RouteList, RouteView } from '#shared/schemas/route-reference'

/** Every route of this server, by group. */
export const useRouteReference = () => useResource<RouteList>('/api/routes')

/** One route, once it is asked for. */
export const useRouteDetail = (id: string) => useLateLoad(() => $fetch<RouteView>(`/api/routes/${id}`))
