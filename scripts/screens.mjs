// `npm run screens`: pictures of every page into screens/, see scripts/screens/run.ts. Vite reads the TypeScript.
import { fileURLToPath } from 'node:url'
import { createServer } from 'vite'

const vite = await createServer({
  configFile: false,
  root: fileURLToPath(new URL('..', import.meta.url)),
  appType: 'custom',
  server: { middlewareMode: true, hmr: false, ws: false, watch: null },
  optimizeDeps: { noDiscovery: true },
})
try {
  const { run } = await vite.ssrLoadModule('/scripts/screens/run.ts')
  await run(process.argv.slice(2))
} finally {
  await vite.close()
}
