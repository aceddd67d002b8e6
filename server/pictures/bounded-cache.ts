/**
 * Answers by key, made once however many ask at the same time. The ones used last are kept, up to a sum of sizes; a
 * failure is not kept.
 */
export class BoundedCache<T> {
  private readonly kept = new Map<string, { value: Promise<T>; size: number }>()
  private held = 0

  constructor(private readonly mostHeld: number, private readonly sizeOf: (value: T) => number) {}

  get(key: string, make: () => Promise<T>): Promise<T> {
    const known = this.kept.get(key)
    if (known) {
      this.kept.delete(key)
      this.kept.set(key, known)
      return known.value
    }
    const entry = { value: make(), size: 0 }
    this.kept.set(key, entry)
    entry.value.then(
      (value) => {
        entry.size = this.sizeOf(value)
        this.held += entry.size
        this.drop()
      },
      () => this.kept.delete(key),
    )
    return entry.value
  }

  private drop(): void {
    for (const [oldest, { size }] of this.kept) {
      if (this.held <= this.mostHeld) return
      // What is still being made has no size yet, and somebody waits for it.
      if (size === 0) continue
      this.kept.delete(oldest)
      this.held -= size
    }
  }
}
