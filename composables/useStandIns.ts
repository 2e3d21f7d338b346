import type { Page } from '#shared/schemas/common'
import type { MakeStandIn, StandInView } from '#shared/schemas/stand-ins'

/** Whose reviews are in whose hands, now and to come. */
export const useStandIns = () => useWholeList<Page<StandInView>>('/api/stand-ins')

/** Handing reviews over, and taking them back. */
export function useStandInActions() {
  const api = useApi()
  return {
    make: (input: MakeStandIn) => api.post<{ id: string }>('/api/stand-ins', { ...input }),
    takeBack: (id: string) => api.remove(`/api/stand-ins/${id}`),
  }
}
