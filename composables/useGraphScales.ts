import type { Form } from '#shared/engine/problem/problem'
import { countSteps, scaleOf, stepOf } from '~/utils/problem/coefficient-scale'
import { coefficientsOf } from '~/utils/problem/graph'
import type { ProblemGraph } from '~/utils/problem/graph'

/** Scales of the interactions and of the linear coefficients in one form, and which of their steps are shown. */
export function useGraphScales(graph: () => ProblemGraph, form: () => Form) {
  const coefficients = computed(() => coefficientsOf(graph(), form()))
  const lineScale = computed(() => scaleOf(coefficients.value.values))
  const markScale = computed(() => scaleOf(coefficients.value.linear))
  const lineSteps = computed(() => Int8Array.from(coefficients.value.values, (v) => stepOf(lineScale.value, v)))
  const markSteps = computed(() => Int8Array.from(coefficients.value.linear, (v) => stepOf(markScale.value, v)))
  const legend = computed(() => ({
    lines: { scale: lineScale.value, counts: countSteps(lineScale.value, coefficients.value.values) },
    marks: { scale: markScale.value, counts: countSteps(markScale.value, coefficients.value.linear) },
  }))
  return { coefficients, lineScale, markScale, lineSteps, markSteps, legend, hidden: useHiddenSteps() }
}

/** Steps of the scales that the legend switched off. */
function useHiddenSteps() {
  const lines = shallowRef<ReadonlySet<number>>(new Set())
  const marks = shallowRef<ReadonlySet<number>>(new Set())
  function toggle(of: 'lines' | 'marks', step: number) {
    const set = of === 'lines' ? lines : marks
    const next = new Set(set.value)
    if (!next.delete(step)) next.add(step)
    set.value = next
  }
  function showAll() {
    lines.value = new Set()
    marks.value = new Set()
  }
  return { lines, marks, toggle, showAll, isAny: computed(() => lines.value.size + marks.value.size > 0) }
}
