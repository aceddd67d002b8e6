import { describe, expect, it } from 'vitest'
import { EnvNotValid, readEnv } from '../../server/env'

describe('the environment', () => {
  it('is read whatever NODE_ENV a host sets: nothing depends on it', () => {
    expect(readEnv('test', { NODE_ENV: 'staging', PORT: '4200' }).port).toBe(4200)
  })

  it('that makes no sense is refused with what to set', () => {
    expect(() => readEnv('test', { PORT: 'many' })).toThrow(EnvNotValid)
    expect(() => readEnv('test', { PORT: 'many' })).toThrow(/PORT/)
  })
})
