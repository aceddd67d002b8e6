import type { Position } from 'geojson'
import type { CheckedOutline } from '../geography/outline/check-outline'

/** What a worker does with outlines as people send them. A refusal is an answer, not a fault. */
export interface OutlineTasks {
  checkOutline: { input: { sent: unknown; inland: boolean }; output: OutlineOutcome }
}

export type OutlineOutcome = { outline: CheckedOutline } | { refused: { sentence: string; place: Position | null; reason: 'all-land' | null } }
