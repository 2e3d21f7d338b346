/** The newest thing that a person made in each step of the main job; null where the step is not done yet. */
export interface FirstStepsDone {
  problem: { id: string; number: number; name: string } | null
  embedding: { id: string; number: number; problem: string } | null
  runSheet: { id: string; number: number } | null
  rehearsal: { id: string; number: number; runSheet: number } | null
  submission: { id: string; number: number } | null
}

export type FirstStep = keyof FirstStepsDone

export interface FirstStepsView {
  /** Of the demo workspace, where the steps are shown unasked. */
  demo: boolean
  done: FirstStepsDone
}
