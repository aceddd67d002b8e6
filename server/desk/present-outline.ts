import type { z } from 'zod'
import type { foundOutline, OutlineRefusal } from '../../shared/schemas/outlines'
import type { CheckedOutline } from '../geography/outline/check-outline'
import type { RefusedOutline } from '../workers/outline-tasks'

export function presentOutline({ geometry, areaKm2, repairs, marks }: CheckedOutline): z.infer<typeof foundOutline> {
  return { geometry, areaKm2, repairs, marks }
}

export function presentRefusal({ sentence, place, reason }: RefusedOutline['refused']): OutlineRefusal {
  return { sentence, reason, place: place && { longitude: place[0]!, latitude: place[1]! } }
}
