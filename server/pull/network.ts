import type { Context } from '../context'
import { createGate, type Gate } from './gate'
import { createHostTurns, type HostTurns } from './host-turns'

export interface PullLimits {
  connectMs: number
  headersMs: number
  /** Longest silence while a file comes. */
  idleMs: number
  /** Longest time for one answer with its file, so that a trickle ends too. */
  wholeMs: number
}

/** What fetching has to do with the world outside: one a process. */
export interface Network {
  gate: Gate
  turns: HostTurns
  limits: PullLimits
  stopping: AbortController
}

export const usualLimits: PullLimits = { connectMs: 10_000, headersMs: 30_000, idleMs: 60_000, wholeMs: 3_600_000 }

const networks = new WeakMap<Context, Network>()

export function networkOf(context: Context): Network {
  const known = networks.get(context)
  return known ?? useNetwork(context, {})
}

/** Sets another gate or other limits for a context. */
export function useNetwork(context: Context, parts: Partial<Network>): Network {
  const network: Network = {
    gate: createGate({ allowPrivate: context.env.pullAllowPrivate }),
    turns: createHostTurns(),
    limits: usualLimits,
    stopping: new AbortController(),
    ...parts,
  }
  networks.set(context, network)
  return network
}

/** Ends what is under way; its jobs are given back at the next start. */
export function stopPulls(context: Context): void {
  networks.get(context)?.stopping.abort()
}
