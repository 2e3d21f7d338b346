import type { GroupsView } from '#shared/schemas/groups'
import type { DraftGroup } from '~/utils/problem/groups'
import { notAmong, requestOf, withFreshNames } from '~/utils/problem/groups'

/** The groups of a problem as they are being changed: nothing counts until all of them are saved at once. */
export function useGroupDraft(view: () => GroupsView | null) {
  const draft = shallowRef<DraftGroup[]>([])
  const isChanged = ref(false)
  /** Number of the group in the form, its length for a new one, null while none is open. */
  const editing = ref<number | null>(null)

  function restart() {
    draft.value = [...(view()?.confirmed ?? [])]
    isChanged.value = false
    editing.value = null
  }
  watch(view, restart, { immediate: true })

  function change(groups: DraftGroup[]) {
    draft.value = groups
    isChanged.value = true
  }
  const others = computed(() => notAmong(draft.value, view()?.recognised ?? []))
  return {
    draft,
    isChanged,
    editing,
    /** Recognised groups that the draft leaves out. */
    others,
    restart,
    adopt: (groups = others.value) => change([...draft.value, ...withFreshNames(draft.value, groups)]),
    remove: (index: number) => change(draft.value.filter((_, g) => g !== index)),
    take: (group: DraftGroup) => {
      const index = editing.value ?? draft.value.length
      change([...draft.value.slice(0, index), group, ...draft.value.slice(index + 1)])
      editing.value = null
    },
    request: () => requestOf(draft.value, view()!.problemVersion),
  }
}
