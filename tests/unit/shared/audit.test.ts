import { readdirSync, readFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { expect, it } from 'vitest'
import { DEEDS } from '../../../shared/audit'

const root = fileURLToPath(new URL('../../../server/api/', import.meta.url))

/** `run-sheets/[id]/approve.post.ts` as `POST /api/run-sheets/:id/approve`. */
function addressOf(file: string): string {
  const [, path, method] = /^(.*)\.(get|post|put|patch|delete)\.ts$/.exec(file)!
  const address = path!.replace(/\[(\w+)\]/g, ':$1').replace(/(^|\/)index$/, '')
  return `${method!.toUpperCase()} /api/${address}`
}

it('knows of every route behind sign-in that changes something, and of no other', () => {
  const all = readdirSync(root, { recursive: true, encoding: 'utf8' })
  const files = all.filter((file) => /\.(?:post|put|patch|delete)\.ts$/.test(file))
  const behind = files.filter((file) => !readFileSync(`${root}${file}`, 'utf8').includes('definePublicRoute'))
  const told = Object.keys(DEEDS).filter((address) => !address.startsWith('GET '))
  expect(behind.map(addressOf).sort()).toEqual(told.sort())
})

it('names reading only of routes that there are', () => {
  const all = readdirSync(root, { recursive: true, encoding: 'utf8' })
  const addresses = all.filter((file) => file.endsWith('.get.ts')).map(addressOf)
  for (const address of Object.keys(DEEDS)) if (address.startsWith('GET ')) expect(addresses).toContain(address)
})
