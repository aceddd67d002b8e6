import { createHash, randomBytes } from 'node:crypto'

/** 32 random bytes, fit for a link or a header. Only its hash is ever stored. */
export function newSecret(): string {
  return randomBytes(32).toString('base64url')
}

export function hashSecret(secret: string): string {
  return createHash('sha256').update(secret).digest('hex')
}
