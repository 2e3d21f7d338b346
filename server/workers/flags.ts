/** Places of the two int32 that a task's thread and its caller share: 1 asks the task to stop; 1 says that it began. */
export const FLAGS = { stop: 0, begun: 1 } as const
