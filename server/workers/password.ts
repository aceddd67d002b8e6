import { compare, hash } from 'bcryptjs'

const usualCost = 12

export function hashPassword({ password, cost = usualCost }: { password: string; cost?: number }): Promise<string> {
  return hash(password, cost)
}

export function comparePassword({ password, hash: known }: { password: string; hash: string }): Promise<boolean> {
  return compare(password, known)
}
