import type { RefusalCode } from '../../shared/errors'

/** Thrown when a file or one of its layers can't be read with certainty. `message` is a sentence for a person. */
export class LayerRefused extends Error {
  constructor(
    readonly code: RefusalCode,
    message: string,
    readonly facts: Record<string, unknown> = {},
    options?: ErrorOptions,
  ) {
    super(message, options)
    this.name = 'LayerRefused'
  }
}
