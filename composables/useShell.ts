import type { ComputedRef, Ref } from 'vue'

/** Machine time of the month, in seconds, as the foot of the rail shows it. */
export interface MachineTime {
  /** `Machine time, Dec.` */
  label: string
  grantedSeconds: number
  reservedSeconds: number
  spentSeconds: number
}

export interface RailLink {
  key: string
  label: string
  to: string
}

export interface Shell {
  workspaceName: ComputedRef<string>
  personName: ComputedRef<string>
  roles: ComputedRef<string[]>
  /** Shown at the end of a rail link; a missing count shows nothing. */
  counts: ComputedRef<Record<string, number | null | undefined>>
  machineTime: Ref<MachineTime | null>
  links: ComputedRef<RailLink[]>
}

const LINKS: RailLink[] = [
  { key: 'problems', label: 'Problems', to: '/' },
  { key: 'machines', label: 'Machines', to: '/machines' },
  { key: 'runSheets', label: 'Run sheets', to: '/run-sheets' },
  { key: 'people', label: 'People', to: '/people' },
]

/** What the frame around every page shows, taken from whoever is signed in. */
export function useShell(): Shell {
  const { session } = useSession()
  return {
    workspaceName: computed(() => session.value?.workspace.name ?? ''),
    personName: computed(() => session.value?.person.name ?? ''),
    roles: computed(() => session.value?.roles ?? []),
    counts: computed(() => ({ ...session.value?.counts })),
    machineTime: useState<MachineTime | null>('shell:machine-time', () => null),
    links: computed(() => (session.value ? LINKS : [])),
  }
}
