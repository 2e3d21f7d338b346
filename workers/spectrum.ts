import type { EnergyTable } from '../shared/engine/machine/energy-table'
import { spectrumOf } from '../shared/engine/spectrum/spectrum'
import type { Spectrum, SpectrumOptions } from '../shared/engine/spectrum/spectrum'
import type { SpinModel } from '../shared/engine/spectrum/spin-operator'

export interface SpectrumRequest {
  readonly model: SpinModel
  readonly table: EnergyTable
  readonly options: SpectrumOptions
}

export type SpectrumReport = { readonly share: number } | { readonly spectrum: Spectrum } | { readonly failure: string }

/** Works a spectrum out and tells how far it is; to be stopped by ending the worker. */
addEventListener('message', ({ data: { model, table, options } }: MessageEvent<SpectrumRequest>) => {
  const tell = (report: SpectrumReport): void => postMessage(report)
  try {
    const spectrum = spectrumOf(model, table, options, { cancelled: () => false, report: tell })
    if (spectrum) tell({ spectrum })
  } catch (error) {
    tell({ failure: error instanceof Error ? error.message : String(error) })
  }
})
