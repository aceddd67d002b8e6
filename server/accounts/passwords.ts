import type { Context } from '../context'

/** Of a password nobody has: compared where there is no account, so that the answer takes the same time. */
const nobodysHash = '$2b$12$J1WOV9VQMCRH.Mpe8zvmvOMvb0eKsKwGcKE2t65TMKEUC0G4Tffbu'
const testCost = 4

export function hashPassword(context: Context, password: string): Promise<string> {
  return context.workers.light('hashPassword', context.env.mode === 'test' ? { password, cost: testCost } : { password })
}

export async function passwordMatches(context: Context, password: string, hash: string | null): Promise<boolean> {
  const matches = await context.workers.light('comparePassword', { password, hash: hash ?? nobodysHash })
  return matches && hash !== null
}
