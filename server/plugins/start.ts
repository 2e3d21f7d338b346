import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { availableParallelism } from 'node:os'
import { dirname, join } from 'node:path'
import { openSender } from '../bridge/sender'
import { DEMO_ACCOUNTS, DEMO_PASSWORD } from '../../shared/demo-accounts'
import { seedDemo } from '../services/demo/seed'
import { setupCode } from '../services/people'
import { providerSettingsOf } from '../identity/settings'
import { openPost } from '../mail/post'
import { mailSettingsOf } from '../mail/settings'
import { rateSettingsOf } from '../rate-limit/settings'
import type { StartedApp } from '../start'
import { dataFolderOf, startApp } from '../start'

const MINIMUM_PASSWORD_LENGTH = 32

/**
 * Sessions are sealed with NUXT_SESSION_PASSWORD. Only the demo may make its own, kept in the data folder so that a
 * restart signs nobody out.
 */
function prepareSessions(demo: boolean, dataFolder: string): void {
  if (demo || process.env.ALLOW_PLAIN_HTTP === 'true') process.env.NUXT_SESSION_COOKIE_SECURE ??= 'false'
  if (process.env.NUXT_SESSION_PASSWORD) {
    if (process.env.NUXT_SESSION_PASSWORD.length >= MINIMUM_PASSWORD_LENGTH) return
    stop(`NUXT_SESSION_PASSWORD has fewer than ${MINIMUM_PASSWORD_LENGTH} characters. Sessions would not be safe.`)
  }
  if (!demo)
    stop(
      'NUXT_SESSION_PASSWORD is not set. Give a random text of at least 32 characters, for example from: openssl rand -base64 32',
    )
  mkdirSync(dataFolder, { recursive: true })
  const file = join(dataFolder, 'session-password')
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 })
  process.env.NUXT_SESSION_PASSWORD = readFileSync(file, 'utf8').trim()
}

function stop(message: string): never {
  console.error(message)
  process.exit(1)
}

/** Where this process is reached from the same machine. */
function ownAddress(): string {
  const { NITRO_HOST, HOST, NITRO_PORT, PORT } = process.env
  const host = NITRO_HOST || HOST || 'localhost'
  const name = ['0.0.0.0', '::'].includes(host) ? 'localhost' : host.includes(':') ? `[${host}]` : host
  return `http://${name}:${NITRO_PORT || PORT || 3000}`
}

/** What is wrong with the environment ends the start, in words. */
function read<T>(settings: () => T): T {
  try {
    return settings()
  } catch (error) {
    return stop((error as Error).message)
  }
}

/** Says where to go, once everything is open and, in the demo, filled. */
function announce(demo: boolean): void {
  console.log(`\nEspalier is ready: ${ownAddress()}`)
  if (!demo) return
  console.log(`Demo accounts, password ${DEMO_PASSWORD}:`)
  for (const { email, roles } of DEMO_ACCOUNTS) console.log(`  ${email.padEnd(32)}${roles.join(', ')}`)
}

/** Opens everything, then either seeds the demo or prints the code for the first account. */
async function boot(): Promise<StartedApp> {
  const demo = process.env.DEMO === 'true'
  const dataFolder = dataFolderOf(process.env)
  prepareSessions(demo, dataFolder)
  const mail = read(() => mailSettingsOf(process.env, ownAddress()))
  read(() => rateSettingsOf(process.env))
  const provider = read(() => providerSettingsOf(process.env))
  const started = await startApp({
    databaseUrl: process.env.DATABASE_URL || undefined,
    dataFolder,
    demo,
    workersFolder: () => useRuntimeConfig().workersFolder || join(dirname(process.argv[1]!), 'workers'),
    privateAddresses: process.env.BRIDGE_PRIVATE_ADDRESSES,
    provider,
    concurrency: process.env.JOBS === undefined ? availableParallelism() : Number(process.env.JOBS),
  })
  if (demo) await seedDemo(started.app, PASSWORDS)
  // After the demo is filled: what is written to its invented people is kept, not sent.
  const post = await openPost(started.app, mail)
  const sender = openSender(started.app)
  const code = await setupCode(started.app)
  announce(demo)
  if (code)
    console.log(
      `\nNo account exists yet. Open /setup and create the owner’s account with this one-time code: ${code}\n`,
    )
  return {
    ...started,
    async close() {
      await post.stop()
      await sender.stop()
      await started.close()
    },
  }
}

/** Without this the process would stay, serving nothing, when another program has the port. */
function stopWhenPortIsTaken(error: NodeJS.ErrnoException & { port?: number }): void {
  if (error.code === 'EADDRINUSE' && error.port)
    stop(`Port ${error.port} is in use by another program. Stop that one, or choose another port with PORT.`)
}

export default defineNitroPlugin((nitro) => {
  process.on('uncaughtException', stopWhenPortIsTaken)
  const started = boot()
  setApp(started.then(({ app }) => app))
  started.catch((error: Error) => stop(`Espalier could not start: ${error.message}`))
  for (const signal of ['SIGTERM', 'SIGINT'] as const) process.once(signal, endEventStreams)
  nitro.hooks.hook('close', async () => (await started).close())
})
