import { readdirSync } from 'node:fs'
import { join, relative, sep } from 'node:path'

/** A page of the product: `/problems/:id`, from `problems/[id]/index.vue`. */
export interface Route {
  readonly pattern: string
  readonly file: string
  readonly isDynamic: boolean
}

/** `[id]`, `[[id]]` and `[...path]` of a file name, as the router writes them. */
function segmentOf(part: string): string {
  return part
    .replace(/\[\[(\w+)\]\]/g, ':$1?')
    .replace(/\[\.\.\.(\w+)\]/g, ':$1(.*)*')
    .replace(/\[(\w+)\]/g, ':$1')
}

/** The router's pattern of a file below the folder of pages. Groups in parentheses are no part of an address. */
export function patternOf(file: string): string {
  const parts = file.replace(/\.vue$/, '').split(sep)
  const named = parts.filter((part) => !/^\(.*\)$/.test(part)).map(segmentOf)
  if (named.at(-1) === 'index') named.pop()
  return `/${named.join('/')}`
}

/** Every page in the folder, fixed ones first. */
export function findRoutes(folder: string): Route[] {
  const files = readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter((entry) => entry.isFile() && entry.name.endsWith('.vue'))
    .map((entry) => relative(folder, join(entry.parentPath, entry.name)))
  return files
    .map((file) => ({ file, pattern: patternOf(file) }))
    .map((route) => ({ ...route, isDynamic: route.pattern.includes(':') }))
    .sort((a, b) => Number(a.isDynamic) - Number(b.isDynamic) || a.pattern.localeCompare(b.pattern))
}

function matcherOf(pattern: string): RegExp {
  const source = pattern
    .split('/')
    .filter(Boolean)
    .map((part) => {
      if (part.endsWith('(.*)*')) return '(?:/.+)?'
      if (/^:\w+\?$/.test(part)) return '(?:/[^/]+)?'
      return `/${part.replace(/:\w+/g, '[^/]+')}`
    })
    .join('')
  return new RegExp(`^${source || '/'}/?$`)
}

/** The page that an address without query leads to; a fixed address goes before a dynamic one. */
export function routeOf(routes: readonly Route[], path: string): Route | undefined {
  return routes.find(({ pattern }) => matcherOf(pattern).test(path))
}
