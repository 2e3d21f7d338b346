import type { Ref } from 'vue'

export type RailKey = 'problems' | 'machines' | 'runSheets'

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
  workspaceName: Ref<string>
  personName: Ref<string>
  roles: Ref<string[]>
  /** Shown at the end of a rail link; a missing count shows nothing. */
  counts: Ref<Record<string, number | null | undefined>>
  machineTime: Ref<MachineTime | null>
  links: Ref<RailLink[]>
}

const LINKS: RailLink[] = [
  { key: 'problems', label: 'Problems', to: '/' },
  { key: 'machines', label: 'Machines', to: '/machines' },
  { key: 'runSheets', label: 'Run sheets', to: '/run-sheets' },
]

/** What the frame around every page shows: filled once by the application, read by the layouts. */
export function useShell(): Shell {
  const workspaceName = useState('shell:workspace', () => '')
  const personName = useState('shell:person', () => '')
  const roles = useState<string[]>('shell:roles', () => [])
  const counts = useState<Record<string, number | null | undefined>>('shell:counts', () => ({}))
  const machineTime = useState<MachineTime | null>('shell:machine-time', () => null)
  const links = useState<RailLink[]>('shell:links', () => LINKS)

  return { workspaceName, personName, roles, counts, machineTime, links }
}
