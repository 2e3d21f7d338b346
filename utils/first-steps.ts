import type { FirstStep, FirstStepsDone } from '#shared/schemas/first-steps'

export interface StepRow {
  step: FirstStep
  title: string
  words: string
  isDone: boolean
  /** The page where it is done, or what was made there; null until an earlier step is done. */
  to: string | null
  /** Words of the link. */
  link: string
}

const TITLES: Record<FirstStep, { title: string; words: string }> = {
  problem: {
    title: 'Bring a problem in',
    words: 'Paste coefficients or drop a file. Three lines such as a b 1 will do.',
  },
  embedding: {
    title: 'Embed it on a machine',
    words: 'Each variable becomes a chain of qubits. The settings as they stand will do.',
  },
  runSheet: {
    title: 'Prepare a run sheet',
    words: 'On the page of the embedding. Compare the rules of chain strength, and settle on one.',
  },
  rehearsal: {
    title: 'Rehearse it',
    words: 'A classical stand-in for checking settings, not a forecast of the machine. See which chains break.',
  },
  submission: {
    title: 'Submit it for review',
    words: 'Read the checks and sign. A reviewer approves; then it is issued, and its samples come back to it.',
  },
}

/** Where each step is done; `anyProblem` stands in until the person has a problem of their own. */
function placeOf(step: FirstStep, done: FirstStepsDone, anyProblem: string | null): Pick<StepRow, 'to' | 'link'> {
  const { problem, embedding, runSheet, rehearsal, submission } = done
  const page = (to: string | null, link: string) => ({ to, link })
  if (step === 'problem')
    return problem ? page(`/problems/${problem.id}`, `P-${problem.number}`) : page('/problems/new', 'New problem')
  if (step === 'embedding') {
    if (embedding) return page(`/embeddings/${embedding.id}`, `E-${embedding.number} of ${embedding.problem}`)
    const id = problem?.id ?? anyProblem
    return page(id && `/problems/${id}/embed`, 'New embedding')
  }
  if (step === 'runSheet') {
    if (runSheet) return page(`/run-sheets/${runSheet.id}`, `RS-${runSheet.number}`)
    return page(embedding && `/embeddings/${embedding.id}`, 'Use in a run sheet')
  }
  if (step === 'rehearsal') {
    if (rehearsal) return page(`/returns/${rehearsal.id}`, `Rehearsal ${rehearsal.number} of RS-${rehearsal.runSheet}`)
    return page(runSheet && `/run-sheets/${runSheet.id}#samples`, 'Rehearse')
  }
  if (submission) return page(`/run-sheets/${submission.id}`, `RS-${submission.number}`)
  return page(runSheet && `/run-sheets/${runSheet.id}#sign-off`, 'Sign-off')
}

/** The five steps of the main job, with what the person did of them. */
export function firstSteps(done: FirstStepsDone, anyProblem: string | null): StepRow[] {
  return (Object.keys(TITLES) as FirstStep[]).map((step) => ({
    step,
    ...TITLES[step],
    isDone: done[step] !== null,
    ...placeOf(step, done, anyProblem),
  }))
}

/** `2 of 5 done`. */
export const stepsNote = (rows: readonly StepRow[]): string => {
  const count = rows.filter(({ isDone }) => isDone).length
  return count === rows.length ? 'all done' : `${count} of ${rows.length} done`
}
