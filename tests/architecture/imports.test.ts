import { readdirSync, readFileSync } from 'node:fs'
import { dirname, join, normalize } from 'node:path'
import { describe, expect, it } from 'vitest'

interface Source {
  path: string
  text: string
  /** Files inside the project, by their path without ending; packages by their name. */
  imports: string[]
}

/** Statements begin a line, and no quote stands before the name: a path such as '/regions/import' is no import. */
const statements = /^ *(?:import|export)\b(?:[^'"]*?\bfrom)?\s*['"]([^'"]+)['"]/gm
const calls = /(?<![/\w])import\(\s*['"]([^'"]+)['"]/g

const rooms = ['shared', 'server', 'src']
const sources = rooms.flatMap((room) =>
  readdirSync(room, { recursive: true, encoding: 'utf8' })
    .filter((name) => /\.tsx?$/.test(name))
    .map((name): Source => {
      const path = join(room, name)
      const text = readFileSync(path, 'utf8')
      return { path, text, imports: importsOf(path, text) }
    }),
)

function importsOf(path: string, text: string): string[] {
  const found = [statements, calls].flatMap((pattern) => [...text.matchAll(pattern)].map((match) => match[1]!))
  return found.map((name) => (name.startsWith('.') ? normalize(join(dirname(path), name)) : name))
}

const inside = (room: string) => sources.filter((source) => source.path.startsWith(`${room}/`))
const breaches = (of: Source[], isBreach: (name: string) => boolean) => of.flatMap(({ path, imports }) => imports.filter(isBreach).map((name) => `${path} -> ${name}`))
const serverOutside = (...places: string[]) => inside('server').filter(({ path }) => !places.some((place) => path === `server/${place}` || path.startsWith(`server/${place}/`)))

describe('the rooms', () => {
  it('were found', () => {
    for (const room of rooms) expect(inside(room).length).toBeGreaterThan(20)
  })

  it('are read by their statements, not by words that look like them', () => {
    const text = "import { a,\n  b } from './two'\nimport './look.css'\nexport * from 'zod'\nconst path = '/areas/import', from = 'x'\nconst { c } = await import('./late')\n"
    expect(importsOf('src/one.ts', text)).toEqual(['src/two', 'src/look.css', 'zod', 'src/late'])
  })

  it('let imports run one way: client and server know shared, and nobody else', () => {
    expect(breaches(inside('shared'), (name) => /^(server|src|tests)\//.test(name))).toEqual([])
    expect(breaches(inside('server'), (name) => /^(src|tests)\//.test(name))).toEqual([])
    expect(breaches(inside('src'), (name) => /^(server|tests)\//.test(name))).toEqual([])
  })

  it('keep shared pure: no Node, React, ORM, server or disk', () => {
    const pure = ['zod']
    const packages = breaches(inside('shared'), (name) => !name.startsWith('shared/') && !pure.includes(name) && name !== 'geojson')
    expect(packages).toEqual([])
  })

  it('keep the environment in env.ts and the time in clock.ts', () => {
    const naming = (pattern: RegExp, except: string) => [...inside('shared'), ...inside('server')].filter(({ path, text }) => path !== except && pattern.test(text)).map(({ path }) => path)
    expect(naming(/\bprocess\.env\b/, 'server/env.ts')).toEqual([])
    expect(naming(/\bDate\.now\(|new Date\(\)/, 'server/clock.ts')).toEqual([])
  })

  it('keep Sequelize in models, queries, migrations and db.ts', () => {
    expect(breaches(serverOutside('models', 'queries', 'migrations', 'db.ts'), (name) => name === 'sequelize')).toEqual([])
  })

  it('keep Express in app, routes and middleware', () => {
    expect(breaches(serverOutside('app.ts', 'routes', 'middleware'), (name) => name === 'express')).toEqual([])
  })

  it('keep file formats in grids', () => {
    const formats = (name: string) => ['geotiff', 'netcdfjs', 'h5wasm', 'h5wasm/node', 'h5wasm-plugins'].includes(name)
    expect(breaches(serverOutside('grids'), formats)).toEqual([])
  })

  it('keep grids, queries and models below the use cases, and mail free of alerts', () => {
    const above = /^server\/(app|routes|accounts|desk|pipeline|jobs)\b/
    expect(breaches(inside('server/grids'), (name) => above.test(name) || /^server\/(models|queries|mail|workers)\b/.test(name))).toEqual([])
    expect(breaches(inside('server/queries'), (name) => above.test(name))).toEqual([])
    expect(breaches(inside('server/models'), (name) => above.test(name))).toEqual([])
    expect(breaches(inside('server/mail'), (name) => /^server\/(desk|pipeline|routes)\b/.test(name))).toEqual([])
    expect(breaches(inside('server'), (name) => name.startsWith('server/routes') || name.startsWith('server/app')).filter((line) => !/^server\/(app|routes|serve-offing)/.test(line))).toEqual([])
  })

  it('have workers that never open the database', () => {
    expect(breaches(inside('server/workers'), (name) => /^server\/(db|models|queries|migrations|open-context)\b/.test(name) || name === 'sequelize')).toEqual([])
  })

  it('have no circles', () => {
    expect(circles()).toEqual([])
  })

  it('name files in kebab case, and none utils, helpers or manager', () => {
    const names = sources.map(({ path }) => path)
    expect(names.filter((path) => !/^[a-z0-9/.-]+$/.test(path))).toEqual([])
    expect(names.filter((path) => /utils?\b|helpers?\b|manager/.test(path))).toEqual([])
  })
})

/** Circles of imports that remain at run time; types alone make none. */
function circles(): string[] {
  const known = new Map(sources.map((source) => [source.path.replace(/\.tsx?$/, ''), source]))
  const runtime = new Map(
    [...known].map(([name, source]) => [
      name,
      importsOf(source.path, source.text.replace(/^(import|export) type [^'"]+['"][^'"]+['"]/gm, '')).flatMap((to) => (known.has(to) ? [to] : known.has(`${to}/index`) ? [`${to}/index`] : [])),
    ]),
  )
  const found: string[] = []
  const done = new Set<string>()
  const visit = (name: string, trail: string[]) => {
    if (trail.includes(name)) return void found.push([...trail.slice(trail.indexOf(name)), name].join(' -> '))
    if (done.has(name)) return
    for (const next of runtime.get(name) ?? []) visit(next, [...trail, name])
    done.add(name)
  }
  for (const name of runtime.keys()) visit(name, [])
  return found
}
