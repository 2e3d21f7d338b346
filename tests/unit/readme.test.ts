import { readdirSync, readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { expect, it } from 'vitest'

const root = resolve(import.meta.dirname, '../..')
const scripts = resolve(root, 'docs/scripts')
const languages: Record<string, string> = { py: 'python', sh: 'sh' }

it.each(readdirSync(scripts))('the README shows docs/scripts/%s as it stands', (name) => {
  const code = readFileSync(resolve(scripts, name), 'utf8')
  const block = `\`\`\`${languages[name.split('.').at(-1)!]}\n${code}\`\`\`\n`
  expect(readFileSync(resolve(root, 'README.md'), 'utf8').includes(block), 'copy the script into its block').toBe(true)
})
