import type { ArchivedMemberView, WorkspaceView } from '#shared/schemas/archives'
import type { Page } from '#shared/schemas/common'
import type { UsedPasskey } from '#shared/schemas/passkeys'
import type { UploadProgress } from './useUploads'

/** What an export of the workspace would hold, for owners. */
export const useWorkspaceView = () => useResource<WorkspaceView>('/api/workspaces/current')

/** Members where an imported workspace comes from who are not here yet. */
export const useArchivedMembers = () => useWholeList<Page<ArchivedMemberView>>('/api/people/archived')

/** Sending the archive of a workspace. */
export function useImport() {
  const progress = shallowRef<UploadProgress | null>(null)
  let sending: AbortController | null = null
  return {
    progress,
    stop: () => sending?.abort(),
    async send(file: File) {
      sending = new AbortController()
      progress.value = { step: 'sending', share: 0 }
      const form = new FormData()
      form.set('file', file)
      const outcome = await sendForm<{ jobId: string }>('/api/workspaces/import', form, {
        onProgress: (now) => (progress.value = now),
        signal: sending.signal,
      })
      progress.value = null
      return outcome
    },
  }
}

/** Ending a workspace, or one’s own account. */
export function useEnding() {
  const api = useApi()
  return {
    askDeletion: (name: string) => api.put('/api/workspaces/deletion', { name }),
    takeDeletionBack: () => api.remove('/api/workspaces/deletion'),
    removeAccount: (proof: { current?: string; passkey?: UsedPasskey }) => api.remove('/api/account', { ...proof }),
  }
}
