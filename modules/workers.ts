import { copyFile, mkdir } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { defineNuxtModule } from '@nuxt/kit'
import type { BuildOptions } from 'esbuild'
import { build, context } from 'esbuild'

const SHARED: BuildOptions = {
  bundle: true,
  platform: 'node',
  target: 'node20',
  format: 'esm',
  outExtension: { '.js': '.mjs' },
  logLevel: 'warning',
  // These find their own files at run time. All but the solver Nitro copies beside the server, because the web process
  // imports them too.
  external: ['piscina', '@electric-sql/pglite', 'pg-native', 'highs'],
  // The PostgreSQL driver is CommonJS and asks for Node's modules through require.
  banner: {
    js: `import { createRequire as __createRequire } from 'node:module'; const require = __createRequire(import.meta.url);`,
  },
}

/** The MIP solver finds its WebAssembly beside itself, and only threads import it: Nitro does not see that it is needed. */
const SOLVER_FILES = ['package.json', 'LICENSE', 'build/highs.mjs', 'build/highs.wasm']

async function copySolver(from: string, to: string): Promise<void> {
  for (const file of SOLVER_FILES) {
    const target = join(to, 'node_modules/highs', file)
    await mkdir(dirname(target), { recursive: true })
    await copyFile(join(from, 'node_modules/highs', file), target)
  }
}

/**
 * Nitro does not emit worker files, so this bundles the thread entry (dev and build) and the worker process (build):
 * `.output/server/workers/thread.mjs` and `.output/server/worker.mjs`.
 */
export default defineNuxtModule({
  meta: { name: 'workers' },
  setup(_options, nuxt) {
    const thread = { thread: join(nuxt.options.rootDir, 'server/workers/thread.ts') }
    const devFolder = join(nuxt.options.buildDir, 'workers')
    nuxt.options.runtimeConfig.workersFolder = nuxt.options.dev ? devFolder : ''
    nuxt.hook('nitro:init', (nitro) => {
      if (nuxt.options.dev) return
      nitro.hooks.hook('compiled', async () => {
        const folder = nitro.options.output.serverDir
        await build({ ...SHARED, entryPoints: thread, outdir: join(folder, 'workers') })
        await build({
          ...SHARED,
          entryPoints: { worker: join(nuxt.options.rootDir, 'server/worker-process.ts') },
          outdir: folder,
        })
        await copySolver(nuxt.options.rootDir, folder)
      })
    })
    nuxt.hook('build:before', async () => {
      if (!nuxt.options.dev) return
      const watcher = await context({ ...SHARED, entryPoints: thread, outdir: devFolder })
      await watcher.rebuild()
      await watcher.watch()
      nuxt.hook('close', () => watcher.dispose())
    })
  },
})
