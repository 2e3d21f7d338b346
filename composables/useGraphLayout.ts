import { pullsOf, stepsFor } from '~/utils/problem/force-layout'
import type { ProblemGraph } from '~/utils/problem/graph'
import { keepLayout, keptLayout } from '~/utils/problem/kept-layouts'
import type { LayoutReport, LayoutRequest } from '~/workers/problem-layout'

/**
 * Positions of the variables, laid out by a worker of the browser. What was laid out before is taken up again; otherwise
 * it begins by itself.
 */
export function useGraphLayout(problemId: () => string, graph: () => ProblemGraph) {
  const positions = shallowRef<Float32Array>(new Float32Array(0))
  const seed = ref(1)
  const made = ref(0)
  const isSettled = ref(false)
  const steps = computed(() => stepsFor(graph().labels.length))

  function keep() {
    const layout = { fingerprint: graph().fingerprint, seed: seed.value, made: made.value, settled: isSettled.value }
    if (made.value > 0) keepLayout(localStorage, problemId(), { ...layout, positions: positions.value })
  }
  function hear(report: LayoutReport) {
    positions.value = report.positions
    made.value = report.made
    isSettled.value = report.settled
  }
  const { isRunning, start, stop } = useLayoutWorker(hear, keep)

  function run(from: Float32Array | null) {
    stop()
    isSettled.value = false
    made.value = from ? made.value : 0
    const { labels, rows, cols, isingValues } = graph()
    const task = { variables: labels.length, rows, cols, pulls: pullsOf(isingValues), seed: seed.value, start: from }
    start({ ...task, made: made.value, steps: steps.value })
  }

  /** Takes up what was kept of the problem, or begins. */
  function begin() {
    const { fingerprint, labels } = graph()
    const kept = keptLayout(localStorage, problemId(), { fingerprint, variables: labels.length })
    if (!kept) return run(null)
    positions.value = kept.positions
    seed.value = kept.seed
    made.value = kept.made
    isSettled.value = kept.settled
  }

  /** Another picture of the same problem. */
  function again() {
    seed.value += 1
    run(null)
  }
  const isUnfinished = computed(() => !isRunning.value && !isSettled.value && made.value < steps.value)
  const goOn = () => run(positions.value)
  return { positions, seed, made, steps, isSettled, isRunning, isUnfinished, begin, stop, again, goOn }
}

/** One layout at a time in a worker, which ends with the page; `over` follows when it ends or is stopped. */
function useLayoutWorker(hear: (report: LayoutReport) => void, over: () => void) {
  const isRunning = ref(false)
  let worker: Worker | null = null

  function stop() {
    worker?.terminate()
    worker = null
    if (!isRunning.value) return
    isRunning.value = false
    over()
  }
  function start(request: LayoutRequest) {
    isRunning.value = true
    worker = new Worker(new URL('../workers/problem-layout.ts', import.meta.url), { type: 'module' })
    worker.addEventListener('message', ({ data }: MessageEvent<LayoutReport>) => {
      hear(data)
      if (data.over) stop()
    })
    worker.addEventListener('error', stop)
    worker.postMessage(request)
  }
  onBeforeUnmount(stop)
  return { isRunning, start, stop }
}
