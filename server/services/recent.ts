/** Keeps the values made last, at most `size` of them, by key. */
export class Recent<T> {
  private readonly kept = new Map<string, T>()

  constructor(private readonly size: number) {}

  /** The kept value of the key, or the one that `make` gives. */
  get(key: string, make: () => T): T {
    const value = this.kept.get(key) ?? make()
    this.kept.delete(key)
    this.kept.set(key, value)
    if (this.kept.size > this.size) this.kept.delete(this.kept.keys().next().value!)
    return value
  }

  /** The kept value of the key, if there is one. */
  peek(key: string): T | undefined {
    return this.kept.get(key)
  }

  /** Forgets the value of the key, unless it is another one by now. */
  drop(key: string, value: T): void {
    if (this.kept.get(key) === value) this.kept.delete(key)
  }
}
