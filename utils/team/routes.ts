import type { RouteGroup } from '#shared/schemas/route-reference'

/** Groups with the routes in whose method, path, summary or group every word occurs; groups left empty fall away. */
export function routesHolding(groups: readonly RouteGroup[], sought: string): RouteGroup[] {
  const words = sought.toLowerCase().split(/\s+/).filter(Boolean)
  if (words.length === 0) return [...groups]
  return groups.flatMap(({ name, routes }) => {
    const held = routes.filter(({ method, path, summary }) => {
      const text = `${method} ${path} ${summary} ${name}`.toLowerCase()
      return words.every((word) => text.includes(word))
    })
    return held.length > 0 ? [{ name, routes: held }] : []
  })
}
