/** Blocks of numbers by key, the ones used last, up to a number of numbers in all. */
export class StepCache {
  private readonly blocks = new Map<string, Float64Array>()
  private held = 0

  constructor(private readonly mostNumbers: number) {}

  get(key: string): Float64Array | undefined {
    return this.blocks.get(key)
  }

  /** Keeps a block, or moves a kept one to the front. */
  set(key: string, block: Float64Array): void {
    this.held -= this.blocks.get(key)?.length ?? 0
    this.blocks.delete(key)
    this.blocks.set(key, block)
    this.held += block.length
    for (const [oldest, { length }] of this.blocks) {
      if (this.held <= this.mostNumbers) return
      this.blocks.delete(oldest)
      this.held -= length
    }
  }
}
