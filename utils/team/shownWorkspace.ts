import { WORKSPACE_HEADER } from '#shared/workspace-header'

/** Of this tab; never set on the server, where one module serves everybody. */
let shown: string | null = null

/** Says which workspace this tab shows; null where it may be any. */
export function showWorkspace(id: string | null): void {
  shown = id
}

/** So that the server refuses what a tab asks for once another workspace was gone to in another tab. */
export const workspaceHeaders = (): Record<string, string> => (shown ? { [WORKSPACE_HEADER]: shown } : {})
