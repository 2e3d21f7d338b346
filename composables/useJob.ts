import type { JobView } from '#shared/schemas/jobs'

const OVER = ['done', 'failed', 'cancelled']

/** Follows a job by server-sent events until it is over; the browser reconnects by itself when the stream breaks. */
export function useJob(jobId: MaybeRefOrGetter<string | null>, onOver?: () => void) {
  const job = ref<JobView | null>(null)
  const api = useApi()
  let source: EventSource | null = null

  const close = (): void => {
    source?.close()
    source = null
  }
  const follow = (id: string): void => {
    close()
    source = new EventSource(`/api/jobs/${id}/events`)
    source.addEventListener('job', (event) => {
      job.value = JSON.parse(event.data) as JobView
      if (!OVER.includes(job.value.status)) return
      close()
      onOver?.()
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
