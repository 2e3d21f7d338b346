/** Names the workspace that a page shows, with everything that the page asks for. */
export const WORKSPACE_HEADER = 'x-espalier-workspace'
