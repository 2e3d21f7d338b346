import type { Role } from './schemas/common'

/** The invented people of the demo workspace; the sign-in page offers them, so nothing here is a secret. */
export interface DemoAccount {
  email: string
  name: string
  roles: Role[]
}

export const DEMO_PASSWORD = 'brackwater-demo'

export const DEMO_ACCOUNTS: readonly DemoAccount[] = [
  { email: 'owner@brackwater.example', name: 'Rhona Skerry', roles: ['owner'] },
  { email: 'developer@brackwater.example', name: 'Ida Fenn', roles: ['developer'] },
  { email: 'steward@brackwater.example', name: 'Per Lind', roles: ['steward'] },
  { email: 'reviewer@brackwater.example', name: 'Maud Okafor', roles: ['reviewer'] },
  { email: 'reader@brackwater.example', name: 'Tomas Reyl', roles: ['reader'] },
]
