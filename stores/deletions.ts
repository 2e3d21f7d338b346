import { defineStore } from 'pinia'
import { ref } from 'vue'
import type { DeletableKind } from '#shared/schemas/deletions'

/** Something deleted a moment ago that can still be brought back. */
export interface Deletion {
  kind: DeletableKind
  id: string
  /** `P-3, Deck radio channels`. */
  label: string
  /** The server keeps it until then, in milliseconds since 1970. */
  until: number
  state: 'offered' | 'restoring' | 'restored' | 'failed'
  /** Why it could not be brought back. */
  failure: string
}

/** Deletions that are offered to be undone: they outlive the page on which they were made. */
export const useDeletionStore = defineStore('deletions', () => {
  const items = ref<Deletion[]>([])

  const add = (deletion: Pick<Deletion, 'kind' | 'id' | 'label' | 'until'>): void => {
    items.value = [
      ...items.value.filter(({ id }) => id !== deletion.id),
      { ...deletion, state: 'offered', failure: '' },
    ]
  }
  const change = (id: string, change: Partial<Deletion>): void => {
    items.value = items.value.map((item) => (item.id === id ? { ...item, ...change } : item))
  }
  const drop = (id: string): void => {
    items.value = items.value.filter((item) => item.id !== id)
  }
  return { items, add, change, drop }
})
