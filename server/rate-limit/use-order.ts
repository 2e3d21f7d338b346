/**
 * A map that knows which of its keys was set longest ago. The first key of a plain map is found by passing over every place
 * before it that was given up since the map last grew; here one walk goes on from where it was and passes each place once.
 */
export class UseOrder<V extends object> {
  private readonly values = new Map<string, V>()
  private readonly walk = this.values.entries()
  /** Where the walk stands. */
  private first: [string, V] | undefined

  get size(): number {
    return this.values.size
  }

  get(key: string): V | undefined {
    return this.values.get(key)
  }

  /** Makes the key the one that was set last. @param value an object of its own each time */
  set(key: string, value: V): void {
    this.values.delete(key)
    this.values.set(key, value)
  }

  delete(key: string): void {
    this.values.delete(key)
  }

  /** The key that was set longest ago. */
  oldest(): string | undefined {
    while (!this.first || this.values.get(this.first[0]) !== this.first[1]) {
      if (this.values.size === 0) return undefined
      this.first = this.walk.next().value
    }
    return this.first[0]
  }
}
