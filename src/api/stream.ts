import { z } from 'zod'

export const topics = ['alerts', 'regions', 'files', 'jobs', 'feeds', 'letters'] as const
export type Topic = (typeof topics)[number]

const change = z.object({ topic: z.enum(topics), id: z.number().optional() })
export type Change = z.infer<typeof change>

export function readChange(data: string): Change | undefined {
  try {
    return change.parse(JSON.parse(data))
  } catch {
    return undefined
  }
}

/** Which queries (by the first word of their key) a change makes old. */
export const queriesOfTopic: Record<Topic, readonly string[]> = {
  alerts: ['alerts', 'today', 'regions'],
  regions: ['regions', 'today'],
  files: ['files', 'layers', 'today'],
  jobs: ['jobs'],
  feeds: ['feeds', 'today'],
  letters: ['letters'],
}
