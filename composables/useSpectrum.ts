import type { EnergyTable } from '#shared/engine/machine/energy-table'
import type { Spectrum } from '#shared/engine/spectrum/spectrum'
import type { HeldState, SpinsQuery, SpinsView } from '#shared/schemas/spins'
import type { SpectrumReport, SpectrumRequest } from '~/workers/spectrum'

export interface WorkedSpectrum {
  spectrum: Spectrum
  names: string[]
  /** Of chains, not of the logical problem. */
  isOfChains: boolean
  /** The state at which all other chains were held. */
  held: HeldState | null
  seconds: number
}

const OPTIONS = { levels: 6, points: 101, seed: 1 } as const

/** The spectrum of a run sheet's problem or of some of its chains, worked out by a worker of the browser. */
export function useSpectrum(runSheetId: MaybeRefOrGetter<string>) {
  const api = useApi()
  const worked = shallowRef<WorkedSpectrum | null>(null)
  const failure = ref<string | null>(null)
  const share = ref<number | null>(null)
  let worker: Worker | null = null

  function stop(): void {
    worker?.terminate()
    worker = null
    share.value = null
  }

  function work({ names, h, ends, J, held }: SpinsView, isOfChains: boolean, table: EnergyTable): void {
    const begun = performance.now()
    worker = new Worker(new URL('../workers/spectrum.ts', import.meta.url), { type: 'module' })
    worker.addEventListener('message', ({ data }: MessageEvent<SpectrumReport>) => {
      if ('share' in data) {
        share.value = data.share
        return
      }
      if ('spectrum' in data)
        worked.value = { spectrum: data.spectrum, names, held, isOfChains, seconds: (performance.now() - begun) / 1000 }
      else failure.value = data.failure
      stop()
    })
    worker.addEventListener('error', () => {
      failure.value = 'The spectrum could not be worked out in this browser.'
      stop()
    })
    const model = { h: Float64Array.from(h), ends: Uint32Array.from(ends), J: Float64Array.from(J) }
    // The table is a reactive copy of what the page holds; a worker takes plain values only.
    const plain = { s: [...table.s], A: [...table.A], B: [...table.B] }
    worker.postMessage({ model, table: plain, options: OPTIONS } satisfies SpectrumRequest)
  }

  /** @param query which chains are meant, and what becomes of the others; `variables` null for the logical problem */
  async function start(query: SpinsQuery, table: EnergyTable): Promise<void> {
    stop()
    worked.value = null
    failure.value = null
    share.value = 0
    const outcome = await api.post<SpinsView>(`/api/run-sheets/${toValue(runSheetId)}/spins`, query)
    if (outcome.ok) return work(outcome.value, query.variables !== null, table)
    failure.value = outcome.failure.message
    share.value = null
  }
  onBeforeUnmount(stop)
  return { worked, failure, share, start, stop }
}
