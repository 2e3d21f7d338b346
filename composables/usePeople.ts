import type { Page } from '#shared/schemas/common'
import type { MemberView } from '#shared/schemas/session'

export const usePeople = () => useResource<Page<MemberView>>('/api/people')
