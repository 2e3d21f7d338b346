/** Runs numbered pieces of work, at most `width` at a time and in order; the answers stand in the order of the numbers. */
export async function spread<T>(count: number, width: number, run: (number: number) => Promise<T>): Promise<T[]> {
  const answers = new Array<T>(count)
  let next = 0
  const lane = async (): Promise<void> => {
    for (let number = next++; number < count; number = next++) answers[number] = await run(number)
  }
  await Promise.all(Array.from({ length: Math.min(width, count) }, lane))
  return answers
}
