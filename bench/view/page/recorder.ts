export interface Recording {
  /** Milliseconds between frames. */
  readonly frames: number[]
  /** Milliseconds of tasks of the main thread that took 50 or more. */
  readonly longTasks: number[]
}

/** Records every frame from now until `stop`. */
export function startRecorder(): { stop: () => Recording } {
  const frames: number[] = []
  const longTasks: number[] = []
  let last = 0
  let handle = 0
  const tick = (now: number) => {
    if (last > 0) frames.push(now - last)
    last = now
    handle = requestAnimationFrame(tick)
  }
  handle = requestAnimationFrame(tick)
  const observer = new PerformanceObserver((list) =>
    longTasks.push(...list.getEntries().map((entry) => entry.duration)),
  )
  observer.observe({ entryTypes: ['longtask'] })
  return {
    stop() {
      cancelAnimationFrame(handle)
      longTasks.push(...observer.takeRecords().map((entry) => entry.duration))
      observer.disconnect()
      return { frames, longTasks }
    },
  }
}
