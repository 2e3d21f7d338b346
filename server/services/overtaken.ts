/** Thrown while saving when something that was worked out before the transaction rests on what changed since. */
export class Overtaken extends Error {}

/** Prepares and saves, both anew as long as something overtakes the saving. */
export async function untilSaved<P, T>(prepare: () => Promise<P>, save: (prepared: P) => Promise<T>): Promise<T> {
  for (;;) {
    const prepared = await prepare()
    try {
      return await save(prepared)
    } catch (error) {
      if (!(error instanceof Overtaken)) throw error
    }
  }
}
