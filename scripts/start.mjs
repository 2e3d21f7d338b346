// `npm start`: builds when something changed, then serves. Without any setting it serves the demo on this machine only.
import { spawn } from 'node:child_process'
import { ensureBuild, SERVER_ENTRY } from './build.mjs'

ensureBuild()

const env = { ...process.env }
const configured = ['DATABASE_URL', 'DATA_DIR', 'DEMO', 'NUXT_SESSION_PASSWORD'].some((name) => env[name])
if (!configured) env.DEMO = 'true'
if (env.DEMO === 'true') env.HOST ??= '127.0.0.1'
env.PORT ??= '3000'

const server = spawn(process.execPath, [SERVER_ENTRY], { env, stdio: 'inherit' })
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => server.kill(signal))
server.on('exit', (code, signal) => process.exit(signal ? 1 : (code ?? 0)))
