import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it } from 'vitest'
import { useSelectionStore } from '../../../stores/selection'
import { rangeBetween } from '../../../utils/lattice/range'

const sorted = (set: ReadonlySet<number>) => [...set].sort((a, b) => a - b)

describe('the selection', () => {
  beforeEach(() => setActivePinia(createPinia()))

  it('brings one chain into focus and selection, and lets go of both when it is chosen again', () => {
    const selection = useSelectionStore()
    selection.select([1, 2])
    selection.choose(4)
    expect([selection.focused, sorted(selection.selected)]).toEqual([4, [4]])
    selection.choose(4)
    expect([selection.focused, sorted(selection.selected)]).toEqual([null, []])
  })

  it('adds to the chosen chain and takes out of it, the focus staying', () => {
    const selection = useSelectionStore()
    selection.choose(4)
    selection.toggle(7)
    expect([selection.focused, sorted(selection.selected)]).toEqual([4, [4, 7]])
    selection.toggle(4)
    expect(sorted(selection.selected)).toEqual([7])
  })

  it('extends from the anchor as the rows stand, up and down, and keeps the rest if asked', () => {
    const selection = useSelectionStore()
    const order = [9, 3, 5, 1, 7]
    selection.choose(5)
    selection.extendTo(7, order)
    expect(sorted(selection.selected)).toEqual([1, 5, 7])
    selection.extendTo(9, order)
    expect(sorted(selection.selected)).toEqual([3, 5, 9])
    selection.toggle(7)
    selection.extendTo(1, order, true)
    expect(sorted(selection.selected)).toEqual([1, 3, 5, 7, 9])
  })

  it('begins afresh for another embedding only', () => {
    const selection = useSelectionStore()
    selection.begin('a')
    selection.choose(2)
    selection.toggleKind('free')
    selection.toggleClass('length 3')
    selection.begin('a')
    expect([selection.focused, selection.hiddenKinds.has('free')]).toEqual([2, true])
    selection.begin('b')
    expect([selection.focused, selection.selected.size, selection.hiddenKinds.size]).toEqual([null, 0, 0])
    expect([selection.hiddenClasses.size, selection.anchor]).toEqual([0, null])
  })
})

describe('rangeBetween', () => {
  it('holds both ends, and the second alone without a first', () => {
    expect(rangeBetween([4, 2, 6], 6, 2)).toEqual([2, 6])
    expect(rangeBetween([4, 2, 6], null, 2)).toEqual([2])
    expect(rangeBetween([4, 2, 6], 5, 2)).toEqual([2])
    expect(rangeBetween([4, 2, 6], 4, 5)).toEqual([])
  })
})
