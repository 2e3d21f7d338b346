/** What the first person types to open a new installation. */
export interface SetupDraft {
  code: string
  workspace: string
  name: string
  email: string
  password: string
}

export const emptySetup = (): SetupDraft => ({ code: '', workspace: '', name: '', email: '', password: '' })
