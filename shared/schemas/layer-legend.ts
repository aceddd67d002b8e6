import { z } from 'zod'
import { id, instant } from './common'

/** How the values of a layer become colours (shared/colouring.ts). */
export const colouring = z.object({
  ramp: z.enum(['sea', 'departure']),
  scale: z.enum(['log', 'linear', 'screen']),
  from: z.number(),
  to: z.number(),
  rangeFrom: z.enum(['quantity', 'valid range', 'layer']),
})

/** All that stands under a picture of a layer. */
export const layerLegend = z.object({
  layerId: id,
  quantity: z.string(),
  unit: z.string().nullable(),
  /** Set for composites. */
  period: z.object({ from: instant, to: instant }).nullable(),
  colouring,
  /** All cells were looked at, or strips spread over a very large layer. */
  looked: z.enum(['all', 'strips']),
  cells: z.number().int(),
  valid: z.number().int(),
  /** Why cells are missing, where that is known; one cell may have several reasons. */
  hidden: z.array(z.object({ reason: z.string(), cells: z.number().int() })),
  /** Valid cells by value, evenly along the scale, and those beyond its ends. */
  bins: z.array(z.number().int()),
  below: z.number().int(),
  above: z.number().int(),
})
export type LayerLegend = z.infer<typeof layerLegend>
