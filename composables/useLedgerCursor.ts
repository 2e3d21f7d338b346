import { defaultRangeExtractor, useVirtualizer } from '@tanstack/vue-virtual'

/** A line of a ledger: it is about one variable. */
interface Line {
  readonly variable: number
}

export interface LedgerCursorOptions<Row extends Line> {
  readonly shown: () => readonly Row[]
  /** Variables in the order of the rows. */
  readonly order: () => readonly number[]
  readonly rowHeight: () => number
  /** Rows that a page holds. */
  readonly pageRows: () => number
  readonly scroller: () => HTMLElement | null
  /** What lies over the rows at the top and the bottom of the scroller, in pixels. */
  readonly padding: () => { readonly top: number; readonly bottom: number }
  readonly copy: () => void
}

/**
 * Thousands of rows of which only those in sight exist, and the one of them that the keyboard is on. That row always
 * exists, even scrolled out of sight, so that the browser's focus is never lost with it.
 */
export function useLedgerCursor<Row extends Line>(options: LedgerCursorOptions<Row>) {
  const selection = useSelectionStore()
  const cursor = ref<number | null>(null)
  const position = computed(() => (cursor.value === null ? -1 : options.order().indexOf(cursor.value)))
  const { virtualizer, items } = virtualRows(options, position)
  /** The row that the Tab key reaches. */
  const stop = computed(() => (position.value >= 0 ? cursor.value : (options.order()[0] ?? null)))

  function reveal(variable: number | null) {
    const index = variable === null ? -1 : options.order().indexOf(variable)
    if (index >= 0) virtualizer.value.scrollToIndex(index, { align: 'auto' })
  }

  async function moveTo(index: number, extends_: boolean) {
    const order = options.order()
    const variable = order[Math.min(order.length - 1, Math.max(0, index))]
    if (variable === undefined) return
    if (extends_ && selection.anchor === null && cursor.value !== null) selection.anchor = cursor.value
    cursor.value = variable
    selection.hover(variable)
    if (extends_) selection.extendTo(variable, order)
    reveal(variable)
    await nextTick()
    const row = options.scroller()?.querySelector<HTMLElement>(`[data-variable="${variable}"]`)
    row?.focus({ preventScroll: true })
  }

  const { onKeydown, onRowClick } = ledgerGestures({ ...options, cursor, position, moveTo })

  watch(
    () => selection.focused,
    (variable) => {
      if (variable === null) return
      cursor.value = variable
      reveal(variable)
    },
  )
  watch(() => selection.anchor, reveal)
  watch(options.rowHeight, () => virtualizer.value.measure())
  return { virtualizer, items, stop, onKeydown, onRowClick }
}

/** The rows in sight, and the one at `position` wherever it is. */
function virtualRows<Row extends Line>(
  { shown, order, rowHeight, scroller, padding }: LedgerCursorOptions<Row>,
  position: Ref<number>,
) {
  const virtualizer = useVirtualizer(
    computed(() => {
      const kept = position.value
      const { top, bottom } = padding()
      return {
        count: shown().length,
        getScrollElement: scroller,
        estimateSize: rowHeight,
        getItemKey: (index: number) => order()[index] ?? index,
        overscan: 8,
        scrollMargin: top,
        scrollPaddingStart: top,
        scrollPaddingEnd: bottom,
        rangeExtractor: (range: Parameters<typeof defaultRangeExtractor>[0]) => {
          const indices = defaultRangeExtractor(range)
          if (kept < 0 || kept >= range.count || indices.includes(kept)) return indices
          return [...indices, kept].sort((a, b) => a - b)
        },
      }
    }),
  )
  const items = computed(() =>
    virtualizer.value.getVirtualItems().flatMap(({ index, start }) => {
      const row = shown()[index]
      return row ? [{ row, index, start: start - padding().top }] : []
    }),
  )
  return { virtualizer, items }
}

interface Gestures extends LedgerCursorOptions<Line> {
  readonly cursor: Ref<number | null>
  readonly position: ComputedRef<number>
  readonly moveTo: (index: number, extends_: boolean) => void
}

/** What keys and clicks do to the selection. */
function ledgerGestures({ cursor, position, order, pageRows, moveTo, copy }: Gestures) {
  const selection = useSelectionStore()
  const MOVES: Record<string, () => number> = {
    ArrowDown: () => position.value + 1,
    ArrowUp: () => (position.value < 0 ? order().length - 1 : position.value - 1),
    Home: () => 0,
    End: () => order().length - 1,
    PageDown: () => Math.max(0, position.value) + pageRows(),
    PageUp: () => position.value - pageRows(),
  }
  const ACTIONS: Record<string, (variable: number | null, event: KeyboardEvent) => void> = {
    Enter: (variable) => {
      if (variable === null) return
      if (selection.focused === variable) selection.release()
      else selection.focus(variable)
    },
    ' ': (variable, { shiftKey }) => {
      if (variable === null) return
      if (shiftKey) selection.extendTo(variable, order())
      else selection.toggle(variable)
    },
    Escape: () => (selection.focused === null ? selection.clearSelection() : selection.release()),
  }
  const CONTROLLED: Record<string, () => void> = { a: () => selection.select(order()), c: copy }

  function onKeydown(event: KeyboardEvent) {
    const isOnRow = event.target instanceof HTMLElement && event.target.dataset.variable !== undefined
    if (!isOnRow || event.altKey) return
    const target = Number((event.target as HTMLElement).dataset.variable)
    const move = MOVES[event.key]
    const isControlled = event.ctrlKey || event.metaKey
    if (isControlled && !move) CONTROLLED[event.key.toLowerCase()]?.()
    else if (move) {
      cursor.value = target
      moveTo(move(), event.shiftKey)
    } else ACTIONS[event.key]?.(target, event)
    const isTaken = isControlled && !move ? event.key.toLowerCase() in CONTROLLED : move || event.key in ACTIONS
    if (isTaken) event.preventDefault()
  }

  function onRowClick(event: MouseEvent, variable: number) {
    cursor.value = variable
    if (event.currentTarget instanceof HTMLElement) event.currentTarget.focus({ preventScroll: true })
    const isAdded = event.ctrlKey || event.metaKey
    if (event.shiftKey) selection.extendTo(variable, order(), isAdded)
    else if (isAdded) selection.toggle(variable)
    else selection.choose(variable)
  }
  return { onKeydown, onRowClick }
}
