import type { JobView } from '#shared/schemas/jobs'
import type { ApiFailure } from './useApi'

/** The log of a job that may be long over: fetched when it is first looked at. */
export function useJobLog(jobId: MaybeRefOrGetter<string>) {
  const job = shallowRef<JobView | null>(null)
  const failure = shallowRef<ApiFailure | null>(null)
  const load = async (): Promise<void> => {
    try {
      job.value = await $fetch<JobView>(`/api/jobs/${toValue(jobId)}`)
      failure.value = null
    } catch (error) {
      failure.value = failureOf(error)
    }
  }
  return { job, failure, load }
}
