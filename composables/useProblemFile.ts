import type { ProblemFileKey } from '#shared/problem-files'
import { saveBlob } from '~/utils/ui/saveBlob'
import type { ApiFailure } from './useApi'

/** Which file of a problem is wanted. */
export interface ProblemFileWish {
  form: 'qubo' | 'ising'
  format: ProblemFileKey
  gzip: boolean
}

const NAME = /filename="([^"]+)"/

/** Takes a problem out as a file: whether one is being written, and why it could not be. */
export function useProblemFile(id: string) {
  const isBusy = ref(false)
  const failure = shallowRef<ApiFailure | null>(null)

  const take = async ({ form, format, gzip }: ProblemFileWish, version?: number): Promise<void> => {
    isBusy.value = true
    failure.value = null
    const query = new URLSearchParams({ form, format, ...(gzip && { gzip: '1' }) })
    if (version !== undefined) query.set('version', String(version))
    try {
      const response = await fetch(`/api/problems/${id}/coefficients?${query}`)
      const blob = await response.blob()
      if (response.ok) saveBlob(blob, NAME.exec(response.headers.get('content-disposition') ?? '')?.[1] ?? format)
      else failure.value = failureOf({ statusCode: response.status, data: await errorOf(blob) })
    } catch (error) {
      failure.value = failureOf(error)
    }
    isBusy.value = false
  }
  return { isBusy, failure, take }
}

/** The error object of an answer that was to be a file. */
async function errorOf(blob: Blob): Promise<unknown> {
  try {
    return JSON.parse(await blob.text())
  } catch {
    return undefined
  }
}
