import { createForceLayout, LAYOUT_DEFAULTS } from '../utils/problem/force-layout'
import type { LayoutTask } from '../utils/problem/force-layout'

export interface LayoutRequest extends LayoutTask {
  /** Steps made before, where a layout goes on from its `start`. */
  readonly made: number
  readonly steps: number
}

export interface LayoutReport {
  readonly made: number
  readonly steps: number
  readonly settled: boolean
  readonly over: boolean
  /** x and y of each variable. */
  readonly positions: Float32Array
}

const REPORT_EVERY_MILLISECONDS = 120

/** Lays a problem out and tells how it goes; to be stopped by ending the worker, which loses nothing that was told. */
addEventListener('message', ({ data }: MessageEvent<LayoutRequest>) => {
  const { steps } = data
  const layout = createForceLayout(data)
  let told = performance.now()
  for (let made = data.made + 1; made <= steps; made++) {
    const settled = layout.step() < LAYOUT_DEFAULTS.settled
    const over = settled || made === steps
    if (!over && performance.now() - told < REPORT_EVERY_MILLISECONDS) continue
    told = performance.now()
    const positions = layout.positions()
    postMessage({ made, steps, settled, over, positions } satisfies LayoutReport, { transfer: [positions.buffer] })
    if (over) return
  }
})
