import type { Context } from '../context'
import { unpackFigures } from '../workers/packed-figures'
import type { Tasks, ViewFigures } from '../workers/tasks'

type Input = Tasks['summariseViews']['input']

/** Fewer layers than this are not worth a second thread, which would open their file again. */
export const worthHalving = 16

/** Figures of views; of many layers each of two threads reads one half, in the order the layers stand. */
export async function figuresInHalves({ workers }: Context, input: Input): Promise<ViewFigures[]> {
  if (input.layers.length < worthHalving) return unpackFigures(await workers.heavy('summariseViews', input))
  const middle = input.layers.length >> 1
  // A view whose layers lie in both halves is read with the first.
  const inFirst = input.views.map(({ layers }) => layers.some((layer) => layer < middle))
  const [first, second] = await Promise.all([
    workers.heavy('summariseViews', half(input, inFirst, true)),
    workers.second('summariseViews', half(input, inFirst, false)),
  ])
  const [ofFirst, ofSecond] = [unpackFigures(first), unpackFigures(second)]
  let [a, b] = [0, 0]
  return inFirst.map((isFirst) => (isFirst ? ofFirst[a++]! : ofSecond[b++]!))
}

function half(input: Input, inFirst: readonly boolean[], wanted: boolean): Input {
  const views = input.views.filter((_, i) => inFirst[i] === wanted)
  const used = [...new Set(views.flatMap((view) => view.layers))].sort((a, b) => a - b)
  const places = new Map(used.map((layer, at) => [layer, at]))
  return {
    ...input,
    layers: used.map((layer) => input.layers[layer]!),
    views: views.map(({ layers, weights }) => ({ layers: layers.map((layer) => places.get(layer)!), weights })),
  }
}
