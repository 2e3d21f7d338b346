import type { MemberView } from '#shared/schemas/session'
import { withMentions } from '~/utils/run-sheet/mentions'

/** A remark that is being typed, in which members may be named after `@`; they are looked up once somebody writes. */
export function useRemark() {
  const { data, load } = useMentionable()
  const text = ref('')
  const chosen = ref<MemberView[]>([])
  const members = computed(() => data.value ?? [])
  return {
    text,
    members,
    begin: () => void (data.value ?? load()),
    choose: (member: MemberView) => void chosen.value.push(member),
    /** As it is sent: without white space around it, members by id. */
    written: () => withMentions(text.value.trim(), chosen.value, members.value),
    clear() {
      text.value = ''
      chosen.value = []
    },
  }
}
