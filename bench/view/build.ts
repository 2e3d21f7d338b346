import { join } from 'node:path'
import vue from '@vitejs/plugin-vue'
import tailwind from 'tailwindcss'
import { build } from 'vite'

/** Builds the measuring page from the components as they are, in production mode. @returns its folder */
export async function buildPage(root: string): Promise<string> {
  const outDir = join(root, 'node_modules/.cache/bench/view')
  await build({
    configFile: false,
    root: join(root, 'bench/view/page'),
    logLevel: 'warn',
    plugins: [vue()],
    resolve: { alias: { '~': root, '#shared': join(root, 'shared') } },
    css: { postcss: { plugins: [tailwind(join(root, 'tailwind.config.ts'))] } },
    worker: { format: 'es' },
    build: { outDir, emptyOutDir: true, target: 'es2022', chunkSizeWarningLimit: 1000 },
  })
  return outDir
}
