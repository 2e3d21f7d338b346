import type { ComputedRef } from 'vue'
import type { Role } from '#shared/schemas/common'
import type { SessionView } from '#shared/schemas/session'

/** Machine time of the workspace, in seconds, as the foot of the rail shows it. */
export interface MachineTime {
  grantedSeconds: number
  reservedSeconds: number
  spentSeconds: number
}

export interface RailLink {
  key: string
  label: string
  to: string
  /** Shown to these only. */
  roles?: Role[]
  /** Of what the count is, where it is not of what the page lists: it then stands out. */
  counted?: string
}

export interface Shell {
  personName: ComputedRef<string>
  roles: ComputedRef<string[]>
  /** Shown at the end of a rail link; a missing count shows nothing. */
  counts: ComputedRef<Record<string, number | null | undefined>>
  machineTime: ComputedRef<MachineTime | null>
  links: ComputedRef<RailLink[]>
}

const LINKS: RailLink[] = [
  { key: 'problems', label: 'Problems', to: '/' },
  { key: 'machines', label: 'Machines', to: '/machines' },
  { key: 'runSheets', label: 'Run sheets', to: '/run-sheets' },
  { key: 'budget', label: 'Budget', to: '/budget', roles: ['owner', 'reviewer'] },
  { key: 'people', label: 'People', to: '/people' },
  { key: 'news', label: 'News', to: '/news', counted: 'unread' },
]

/** What the frame around every page shows, taken from whoever is signed in. */
export function useShell(): Shell {
  const { session, may } = useSession()
  return {
    personName: computed(() => session.value?.person.name ?? ''),
    roles: computed(() => session.value?.roles ?? []),
    counts: computed(() => ({ ...session.value?.counts, news: session.value?.unread || null })),
    machineTime: computed(() => session.value && machineTimeOf(session.value)),
    links: computed(() => (session.value ? LINKS.filter(({ roles }) => !roles || may(...roles)) : [])),
  }
}

function machineTimeOf({ budget }: SessionView): MachineTime | null {
  if (!budget) return null
  const { grantedSeconds, reservedSeconds, spentSeconds } = budget
  return { grantedSeconds, reservedSeconds, spentSeconds }
}
