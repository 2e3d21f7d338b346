import type { QuenchSeries, RunSheetView } from '#shared/schemas/run-sheets'
import type { ApiFailure } from './useApi'

/** What a run sheet is talked about and copied into: remarks, duplicates, a quench series. */
export function useRunSheetCopies(
  sheet: Ref<RunSheetView | undefined>,
  { flush, refresh }: { flush: () => Promise<boolean>; refresh: () => Promise<void> },
) {
  const actions = useRunSheetActions()
  const failure = shallowRef<ApiFailure | null>(null)

  async function say(remark: string): Promise<string | null> {
    const outcome = await actions.remark(sheet.value!.id, remark)
    if (outcome.ok) await refresh()
    return outcome.ok ? null : outcome.failure.message
  }

  /** Copies what is saved: what was typed last is saved first. */
  async function duplicate(): Promise<void> {
    await flush()
    const outcome = await actions.duplicate(sheet.value!.id)
    failure.value = outcome.ok ? null : outcome.failure
    if (outcome.ok) await navigateTo(`/run-sheets/${outcome.value.id}`)
  }

  async function quench(series: QuenchSeries): Promise<ApiFailure | null> {
    await flush()
    const outcome = await actions.quench(sheet.value!.id, series)
    if (outcome.ok) await refresh()
    return outcome.ok ? null : outcome.failure
  }

  return { failure, say, duplicate, quench }
}
