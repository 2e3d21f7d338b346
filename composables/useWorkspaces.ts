import { showWorkspace } from '~/utils/team/shownWorkspace'
import type { Outcome } from './useApi'

/** Between the tabs of a browser, which share one session. */
const CHANNEL = 'workspace'

/** Going to another workspace, and making one. */
export function useWorkspaces() {
  const { session } = useSession()
  const api = useApi()

  async function gone<T>(action: () => Promise<Outcome<T>>): Promise<Outcome<T>> {
    // Where one goes to does not depend on what this tab shows.
    showWorkspace(null)
    const outcome = await action()
    if (!outcome.ok) {
      showWorkspace(session.value?.workspace.id ?? null)
      return outcome
    }
    const channel = new BroadcastChannel(CHANNEL)
    channel.postMessage(null)
    channel.close()
    // A whole new page, so that nothing of the workspace before stays in memory.
    await navigateTo('/', { external: true })
    return outcome
  }
  return {
    goTo: (workspaceId: string) => gone(() => api.put('/api/session/workspace', { workspaceId })),
    found: (name: string) => gone(() => api.post<{ id: string }>('/api/workspaces', { name })),
  }
}

/** Whether another tab went to another workspace since this page was loaded. */
export function useGoneElsewhere(): Ref<boolean> {
  const isElsewhere = ref(false)
  let channel: BroadcastChannel | undefined
  onMounted(() => {
    channel = new BroadcastChannel(CHANNEL)
    channel.onmessage = () => (isElsewhere.value = true)
  })
  onUnmounted(() => channel?.close())
  return isElsewhere
}
