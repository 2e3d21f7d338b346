import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs'
import { dirname, join, relative, resolve } from 'node:path'
import { describe, expect, it } from 'vitest'

/** What lint rules cannot see: circles of imports, routes without a role check, topics without a reference test. */
const root = resolve(import.meta.dirname, '../..')

function filesUnder(folder: string, ending: RegExp): string[] {
  return readdirSync(folder).flatMap((name) => {
    const path = join(folder, name)
    if (statSync(path).isDirectory()) return filesUnder(path, ending)
    return ending.test(name) ? [path] : []
  })
}

/** Relative imports of values; type-only imports vanish at build time and may point back. */
function importsOf(path: string): string[] {
  const text = readFileSync(path, 'utf8')
  return [...text.matchAll(/^(?:import|export)\s+(?!type\b)[^'"]*?from\s+'(\.[^']+)'/gm)].flatMap(([, target]) => {
    const base = resolve(dirname(path), target!)
    return [base, `${base}.ts`, join(base, 'index.ts')]
      .filter((file) => existsSync(file) && statSync(file).isFile())
      .slice(0, 1)
  })
}

function findCircle(files: string[]): string[] | null {
  const state = new Map<string, 'open' | 'done'>()
  const trail: string[] = []
  const visit = (file: string): string[] | null => {
    if (state.get(file) === 'done') return null
    if (state.get(file) === 'open') return [...trail.slice(trail.indexOf(file)), file]
    state.set(file, 'open')
    trail.push(file)
    for (const next of importsOf(file)) {
      const circle = visit(next)
      if (circle) return circle
    }
    trail.pop()
    state.set(file, 'done')
    return null
  }
  for (const file of files) {
    const circle = visit(file)
    if (circle) return circle.map((path) => relative(root, path))
  }
  return null
}

describe('the house', () => {
  it('has no circle of imports', () => {
    const files = ['shared', 'server', 'utils', 'composables', 'stores'].flatMap((folder) =>
      filesUnder(join(root, folder), /\.ts$/),
    )
    expect(findCircle(files)).toBeNull()
  })

  it('lets one file of the engine know one package, and no other any', () => {
    const imports = /^(?:import|export|\})[^'\n]*\sfrom '([^.'][^']*)'|\bimport\(?\s*'([^.'][^']*)'/gm
    const known = filesUnder(join(root, 'shared/engine'), /\.ts$/).flatMap((path) =>
      [...readFileSync(path, 'utf8').matchAll(imports)].map(
        ([, from, bare]) => `${relative(root, path)}: ${from ?? bare}`,
      ),
    )
    expect(known).toEqual(['shared/engine/formats/archive.ts: fflate'])
  })

  it('sends every route through the role check, or says that it is public', () => {
    const open = [
      'bridge-calls/[id]/refusal.post.ts',
      'bridge-calls/[id]/samples.post.ts',
      'entrance.get.ts',
      'health.get.ts',
      'invited/[secret].get.ts',
      'invited/[secret].post.ts',
      'addresses/[secret].get.ts',
      'addresses/[secret].post.ts',
      'answer-sheets/[token].get.ts',
      'openapi.json.get.ts',
      'passkeys/challenge.post.ts',
      'provider/callback.get.ts',
      'provider/index.post.ts',
      'resets/[secret].get.ts',
      'resets/[secret].post.ts',
      'resets/index.post.ts',
      'routes/[id].get.ts',
      'routes/index.get.ts',
      'schemas/problem.json.get.ts',
      'schemas/samples.json.get.ts',
      'session/passkey.post.ts',
      'session.delete.ts',
      'session.post.ts',
      'setup.post.ts',
    ]
    for (const path of filesUnder(join(root, 'server/api'), /\.ts$/)) {
      const text = readFileSync(path, 'utf8')
      const name = relative(join(root, 'server/api'), path)
      expect(text, name).toMatch(
        open.includes(name) ? /export default definePublicRoute\(/ : /export default define(Session)?Route\(/,
      )
    }
  })

  it('describes every route', () => {
    for (const path of filesUnder(join(root, 'server/api'), /\.ts$/))
      expect(readFileSync(path, 'utf8'), path).toMatch(/\/\*\*[\s\S]*?\*\/\nexport default/)
  })

  it('carries its migrations as they were generated', () => {
    const embedded = readFileSync(join(root, 'server/database/migrations/index.ts'), 'utf8')
    const journal = JSON.parse(readFileSync(join(root, 'server/database/migrations/meta/_journal.json'), 'utf8')) as {
      entries: { tag: string }[]
    }
    for (const { tag } of journal.entries) {
      const text = readFileSync(join(root, `server/database/migrations/${tag}.sql`), 'utf8')
      for (const statement of text.split('--> statement-breakpoint'))
        expect(embedded).toContain(JSON.stringify(statement))
    }
  })

  it('checks every engine topic against the world outside', () => {
    const references = filesUnder(join(root, 'tests/reference'), /\.test\.ts$/)
      .map((path) => readFileSync(path, 'utf8'))
      .join('\n')
    for (const topic of readdirSync(join(root, 'shared/engine'))) {
      if (!statSync(join(root, 'shared/engine', topic)).isDirectory()) continue
      expect(references, topic).toContain(`shared/engine/${topic}/`)
    }
  })
})
