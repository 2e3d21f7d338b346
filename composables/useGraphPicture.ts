import type { Form } from '#shared/engine/problem/problem'
import type { Tokens } from '~/utils/lattice/tokens'
import { radiusOfStep } from '~/utils/problem/coefficient-scale'
import { partnersOf, partnersOfVariable } from '~/utils/problem/graph'
import type { Partner, ProblemGraph } from '~/utils/problem/graph'
import { framedPositions } from '~/utils/problem/graph-frame'
import { shrinkOf } from '~/utils/problem/graph-marks'
import type { GraphPicture } from '~/utils/problem/graph-stage'

/** Lines drawn while the layout of a large problem is still moving: the strongest. */
const MOST_WHILE_MOVING = 2500

const NOTHING_CHOSEN = { focused: null, hovered: null, selected: new Set<number>() }

export interface PictureState {
  readonly graph: () => ProblemGraph
  readonly form: () => Form
  readonly positions: () => Float32Array
  readonly isMoving: () => boolean
  readonly tokens: () => Tokens
}

/** What is drawn of a problem graph for the focus, the selection and the steps shown. */
export function useGraphPicture({ graph, form, positions, isMoving, tokens }: PictureState) {
  const selection = useSelectionStore()
  const { coefficients, lineScale, markScale, lineSteps, markSteps, legend, hidden } = useGraphScales(graph, form)
  const partners = computed(() => partnersOf(graph()))
  const framed = computed(() => framedPositions(positions()))
  // Before the first report of the layout no variable has a place.
  const isPlaced = computed(() => framed.value.length === 2 * graph().labels.length)
  const around = (variable: number | null): Partner[] =>
    variable === null ? [] : partnersOfVariable(partners.value, variable)
  const isHidden = (variable: number) => hidden.marks.value.has(markSteps.value[variable]!)
  const isLineShown = (interaction: number) =>
    !hidden.lines.value.has(lineSteps.value[interaction]!) &&
    !isHidden(graph().rows[interaction]!) &&
    !isHidden(graph().cols[interaction]!)

  const byStrength = computed(() => {
    const { values } = coefficients.value
    return Array.from(values, (_, k) => k).sort((a, b) => Math.abs(values[b]!) - Math.abs(values[a]!))
  })
  const byDegree = computed(() => {
    const { offsets } = partners.value
    const degree = (i: number) => offsets[i + 1]! - offsets[i]!
    return Array.from(graph().labels, (_, i) => i).sort((a, b) => degree(b) - degree(a) || a - b)
  })
  const lines = computed(() => {
    const { rows, cols } = graph()
    const shown = isPlaced.value ? byStrength.value.filter(isLineShown) : []
    const interactions = isMoving() ? shown.slice(0, MOST_WHILE_MOVING) : shown
    return { rows, cols, positions: framed.value, steps: lineSteps.value, scale: lineScale.value, interactions }
  })
  const picture = computed<GraphPicture>(() => {
    const { focused, hovered, selected } = isPlaced.value ? selection : NOTHING_CHOSEN
    const close = [...around(focused), ...(hovered === focused ? [] : around(hovered))]
    const first = [focused, hovered].filter((variable) => variable !== null)
    const order = [...first, ...close.map(({ variable }) => variable), ...selected]
    const ranked = new Set(order).size
    if (focused === null && isPlaced.value) order.push(...byDegree.value)
    const marks = {
      steps: isPlaced.value ? markSteps.value : new Int8Array(0),
      scale: markScale.value,
      tokens: tokens(),
      isHidden,
    }
    const near = new Set(around(focused).map(({ variable }) => variable))
    return {
      lines: lines.value,
      near: close.map(({ interaction }) => interaction).filter(isLineShown),
      marks: { ...marks, positions: framed.value, focused, hovered, selected, near },
      labels: {
        positions: framed.value,
        texts: graph().labels,
        order: [...new Set(order)].filter((variable) => variable < graph().labels.length && !isHidden(variable)),
        insisting: new Set(first).size,
        ranked,
        focused,
        isHidden,
        radius: shrinkOf(graph().labels.length) * radiusOfStep(markScale.value, markScale.value.bounds.length),
      },
    }
  })
  return { coefficients, around, picture, legend, hidden }
}
