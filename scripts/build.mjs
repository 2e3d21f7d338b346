// Builds when there is no build or a source is newer than it. Used by `npm start` and by the tests.
import { spawnSync } from 'node:child_process'
import { existsSync, readdirSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('..', import.meta.url))
const OUTPUT = join(root, '.output/server/worker.mjs')
const SOURCES = [
  ...[
    'app.vue',
    'error.vue',
    'assets',
    'components',
    'composables',
    'docs/openapi.json',
    'docs/problem.schema.json',
    'docs/samples.schema.json',
    'layouts',
    'middleware',
    'modules',
    'nuxt.config.ts',
  ],
  ...['package.json', 'pages', 'plugins', 'public', 'server', 'shared', 'stores', 'tailwind.config.ts', 'utils'],
]

/** The entry that `node` runs. */
export const SERVER_ENTRY = join(root, '.output/server/index.mjs')
/** The entry of an extra worker process. */
export const WORKER_ENTRY = OUTPUT

function newest(path) {
  if (!existsSync(path)) return 0
  const stats = statSync(path)
  if (!stats.isDirectory()) return stats.mtimeMs
  return Math.max(0, ...readdirSync(path).map((name) => newest(join(path, name))))
}

/** Builds if needed. @throws Error when the build fails */
export function ensureBuild() {
  const built = existsSync(OUTPUT) ? statSync(OUTPUT).mtimeMs : 0
  if (SOURCES.every((path) => newest(join(root, path)) <= built)) return
  console.log('Building Espalier (about a minute, only when something changed) …')
  const { status, stdout, stderr } = spawnSync('npx', ['nuxt', 'build'], { cwd: root, encoding: 'utf8' })
  if (status !== 0) throw new Error(`nuxt build failed\n${stdout}\n${stderr}`)
}
