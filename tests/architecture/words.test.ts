import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'

const pages = new URL('../../src/', import.meta.url).pathname
const screens = readdirSync(pages, { recursive: true, encoding: 'utf8' }).filter((name) => name.endsWith('.tsx'))

/** They would promise more about the water than a satellite sees. */
const promises = /\b(clear|toxic|all quiet)\b/i

describe('what screens say', () => {
  it('promises nothing about the water', () => {
    expect(screens.length).toBeGreaterThan(50)
    const found = screens.flatMap((name) =>
      readFileSync(join(pages, name), 'utf8').split('\n').flatMap((line, i) => (promises.test(line) && !/^\s*(\/\/|\/?\*)/.test(line) ? [`${name}:${i + 1} ${line.trim()}`] : [])),
    )
    expect(found).toEqual([])
  })
})
