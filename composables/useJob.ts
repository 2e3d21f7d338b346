import type { JobView } from '#shared/schemas/jobs'
import { followEvents } from './eventStream'

const OVER = ['done', 'failed', 'cancelled']

/** Follows a job by server-sent events until it is over. */
export function useJob(jobId: MaybeRefOrGetter<string | null>, onOver?: () => void) {
  const job = ref<JobView | null>(null)
  const api = useApi()
  let end: (() => void) | null = null

  const close = (): void => {
    end?.()
    end = null
  }
  const follow = (id: string): void => {
    close()
    end = followEvents({
      url: `/api/jobs/${id}/events`,
      event: 'job',
      take(data) {
        job.value = JSON.parse(data) as JobView
        if (!OVER.includes(job.value.status)) return
        close()
        onOver?.()
      },
      isOver: async () => [401, 404].includes((await fetch(`/api/jobs/${id}`)).status),
    })
  }
  onMounted(() =>
    watch(
      () => toValue(jobId),
      (id) => (id ? follow(id) : close()),
      { immediate: true },
    ),
  )
  onBeforeUnmount(close)

  const over = computed(() => job.value !== null && OVER.includes(job.value.status))
  const cancel = async () => {
    const id = toValue(jobId)
    return id ? api.remove<JobView>(`/api/jobs/${id}`) : null
  }
  return { job, over, cancel }
}
