/** All of `order` between two of its members, both included; only the second where the first is not among them. */
export function rangeBetween(order: readonly number[], from: number | null, to: number): number[] {
  const end = order.indexOf(to)
  if (end < 0) return []
  const start = from === null ? -1 : order.indexOf(from)
  if (start < 0) return [to]
  return order.slice(Math.min(start, end), Math.max(start, end) + 1)
}
