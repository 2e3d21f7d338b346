// `npm start`: builds when there is no build or the sources are newer, then serves. Without any setting it serves the demo on
// this machine only.
import { spawn, spawnSync } from 'node:child_process'
import { existsSync, readdirSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const root = fileURLToPath(new URL('..', import.meta.url))
const entry = join(root, '.output/server/index.mjs')
const SOURCES = ['app.vue', 'error.vue', 'assets', 'components', 'composables', 'layouts', 'middleware', 'modules', 'nuxt.config.ts']
const MORE_SOURCES = ['package.json', 'pages', 'plugins', 'public', 'server', 'shared', 'stores', 'tailwind.config.ts', 'utils', 'workers']

function newest(path) {
  if (!existsSync(path)) return 0
  const stats = statSync(path)
  if (!stats.isDirectory()) return stats.mtimeMs
  return Math.max(0, ...readdirSync(path).map((name) => newest(join(path, name))))
}

const built = existsSync(entry) ? statSync(entry).mtimeMs : 0
if ([...SOURCES, ...MORE_SOURCES].some((path) => newest(join(root, path)) > built)) {
  console.log('Building Espalier (about a minute, only when something changed) …')
  const { status } = spawnSync('npx', ['nuxt', 'build'], { cwd: root, stdio: ['ignore', 'ignore', 'inherit'] })
  if (status !== 0) process.exit(status ?? 1)
}

const env = { ...process.env }
const configured = ['DATABASE_URL', 'DATA_DIR', 'DEMO', 'NUXT_SESSION_PASSWORD'].some((name) => env[name])
if (!configured) env.DEMO = 'true'
if (env.DEMO === 'true') env.HOST ??= '127.0.0.1'
env.PORT ??= '3000'

const server = spawn(process.execPath, [entry], { cwd: root, env, stdio: 'inherit' })
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => server.kill(signal))
server.on('exit', (code, signal) => process.exit(signal ? 1 : (code ?? 0)))
