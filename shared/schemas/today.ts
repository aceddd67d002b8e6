import { z } from 'zod'
import { day, id, instant, severity } from './common'

export const today = z.object({
  now: instant,
  demo: z.boolean(),
  /** The page's sentence, from figures: `worry` is set only when something is unusual. */
  statement: z.object({ worry: z.string().nullable(), rest: z.string(), detail: z.string() }),
  newestUsableViewHours: z.number().nullable(),
  coverageFloor: z.number(),
  /** The feed whose layers the day rule and the map show first. */
  feedId: id.nullable(),
  /** Thirty-two days, oldest first. */
  days: z.array(
    z.object({
      day,
      /** Share of the watched water seen; null where no layer came. */
      seen: z.number().nullable(),
      layerId: id.nullable(),
      due: z.boolean(),
      alerts: z.array(z.object({ id, severity })),
    }),
  ),
})
export type Today = z.infer<typeof today>
