import type { Tokens } from '~/utils/lattice/tokens'
import { variableAtPixel, viewOfVariables, viewWithVariable, zoomedView } from '~/utils/problem/graph-camera'
import { createGraphStage } from '~/utils/problem/graph-stage'
import type { GraphPicture, GraphStage } from '~/utils/problem/graph-stage'

export interface StageRefs {
  readonly lines: Ref<HTMLCanvasElement | undefined>
  readonly near: Ref<HTMLCanvasElement | undefined>
  readonly marks: Ref<HTMLElement | undefined>
  readonly labels: Ref<HTMLCanvasElement | undefined>
}

const ZOOM = 1.35
const GLIDE_MILLISECONDS = 160
const glide = () => (matchMedia('(prefers-reduced-motion: reduce)').matches ? 0 : GLIDE_MILLISECONDS)

/** The drawing of a problem graph in its frame: camera, and which variable lies where. */
export function useGraphStage(
  refs: StageRefs,
  picture: () => GraphPicture,
  tokens: () => Tokens,
  onPick: (variable: number, isAdditive: boolean) => void,
) {
  const hasFailed = ref(false)
  let stage: GraphStage | null = null
  let observer: ResizeObserver | null = null

  function build() {
    const [lines, near, marks, labels] = [refs.lines.value, refs.near.value, refs.marks.value, refs.labels.value]
    if (!lines || !near || !marks || !labels) return
    const kept = stage?.view()
    stage?.kill()
    try {
      stage = createGraphStage({ lines, near, marks, labels }, tokens(), (x, y, isAdditive) => {
        const variable = variableAt(x, y)
        if (variable >= 0) onPick(variable, isAdditive)
      })
    } catch {
      hasFailed.value = true
      return
    }
    stage.give(picture())
    stage.moveTo(kept ?? viewOfVariables(positions(), stage.size()))
  }
  const positions = () => picture().marks.positions

  function variableAt(x: number, y: number): number {
    const found = stage ? variableAtPixel(stage.view(), positions(), x, y) : -1
    return found >= 0 && picture().marks.isHidden(found) ? -1 : found
  }
  /** Moves the camera so that all is in sight, or some variables are. */
  function fit(variables?: readonly number[]) {
    stage?.moveTo(viewOfVariables(positions(), stage.size(), variables), glide())
  }
  function zoom(by: number) {
    if (stage) stage.moveTo(zoomedView(stage.view(), stage.size(), by), glide())
  }
  /** Brings a variable into sight without changing the zoom. */
  function bringIntoSight(variable: number) {
    const view = stage && viewWithVariable(stage.view(), stage.size(), positions(), variable)
    if (view) stage?.moveTo(view, glide())
  }

  onMounted(async () => {
    await nextTick()
    await document.fonts?.ready
    build()
    observer = new ResizeObserver(() => stage?.resize())
    if (refs.marks.value) observer.observe(refs.marks.value)
  })
  onBeforeUnmount(() => {
    observer?.disconnect()
    stage?.kill()
    stage = null
  })
  watch(picture, (next) => stage?.give(next))
  watch(tokens, build)
  return { hasFailed, fit, zoomIn: () => zoom(ZOOM), zoomOut: () => zoom(1 / ZOOM), bringIntoSight, variableAt }
}
