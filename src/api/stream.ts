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

/** Queries by the beginning of their key, or by all of it. */
export interface StaleQueries {
  queryKey: readonly (string | number)[]
  exact?: boolean
}

const all = (...words: string[]): StaleQueries[] => words.map((word) => ({ queryKey: [word] }))

/**
 * Which queries a change makes old. Of one region only its own and the lists it stands in; of a file all files, as one may
 * replace another, but no layer that was read before.
 */
export function staleQueries({ topic, id }: Change): StaleQueries[] {
  switch (topic) {
    case 'alerts': return all('alerts', 'today', 'regions')
    case 'regions':
      return id === undefined ? all('regions', 'today') : [{ queryKey: ['regions'], exact: true }, { queryKey: ['regions', id] }, ...all('today')]
    case 'files':
      return id === undefined
        ? all('files', 'layers', 'today')
        : [...all('files', 'today'), { queryKey: ['layers', 'list'] }, { queryKey: ['layers', 'days'] }]
    case 'feeds': return all('feeds', 'today')
    case 'jobs': return all('jobs')
    case 'letters': return all('letters')
  }
}
