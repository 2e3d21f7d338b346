import type { SessionView } from '#shared/schemas/session'
import { showWorkspace } from '~/utils/team/shownWorkspace'

/** Keeps what the tab says of its workspace in step with what it shows. */
export default defineNuxtPlugin(() => {
  const session = useState<SessionView | null>('session', () => null)
  watch(session, (view) => showWorkspace(view?.workspace.id ?? null), { immediate: true, flush: 'sync' })
})
