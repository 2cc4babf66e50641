import { existsSync, readdirSync, readFileSync } from 'node:fs'
import path from 'node:path'
import { describe, expect, it } from 'vitest'
import { inProject } from '../../build/scripts/root.mjs'

const IMPORT = /(?:^|\n)\s*(?:import|export)\s[^'"]*?from\s*['"](\.[^'"?]*)['"]/g

function sources(folder: string): readonly string[] {
  return readdirSync(inProject(folder), { recursive: true, encoding: 'utf8' })
    .map((name) => path.join(folder, name))
    .filter((name) => /\.(ts|vue)$/.test(name) && !name.includes(`${path.sep}assembly${path.sep}`))
}

function resolved(from: string, specifier: string): string | null {
  const base = path.join(path.dirname(from), specifier)
  return (
    [base, `${base}.ts`, path.join(base, 'index.ts')].find(
      (name) => /\.(ts|vue)$/.test(name) && existsSync(inProject(name)),
    ) ?? null
  )
}

function importsOf(file: string): readonly string[] {
  const text = readFileSync(inProject(file), 'utf8')
  return [...text.matchAll(IMPORT)].flatMap(([, specifier]) => {
    const target = specifier === undefined ? null : resolved(file, specifier)
    return target === null ? [] : [target]
  })
}

/** The first circle met, as the files along it; null where there is none. */
function circle(graph: ReadonlyMap<string, readonly string[]>): readonly string[] | null {
  const done = new Set<string>()
  const trail: string[] = []
  const visit = (file: string): readonly string[] | null => {
    if (trail.includes(file)) return [...trail.slice(trail.indexOf(file)), file]
    if (done.has(file)) return null
    trail.push(file)
    for (const next of graph.get(file) ?? []) {
      const found = visit(next)
      if (found !== null) return found
    }
    trail.pop()
    done.add(file)
    return null
  }
  for (const file of graph.keys()) {
    const found = visit(file)
    if (found !== null) return found
  }
  return null
}

describe('imports', () => {
  it('have no circle', () => {
    const files = ['core', 'app', 'renderer'].flatMap(sources)
    expect(files.length).toBeGreaterThan(100)
    expect(circle(new Map(files.map((file) => [file, importsOf(file)])))).toBeNull()
  })

  it('with a planted circle are found out', () => {
    expect(
      circle(
        new Map([
          ['a', ['b']],
          ['b', ['c']],
          ['c', ['b']],
        ]),
      ),
    ).toEqual(['b', 'c', 'b'])
  })
})
