// `npm run openapi`: writes docs/openapi.json from the route files, see scripts/openapi/document.ts. Vite reads the TypeScript.
import { writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { createServer } from 'vite'

const root = fileURLToPath(new URL('..', import.meta.url))
const vite = await createServer({
  configFile: false,
  root,
  appType: 'custom',
  server: { middlewareMode: true, hmr: false, ws: false, watch: null },
  optimizeDeps: { noDiscovery: true },
})
try {
  const { documentText } = await vite.ssrLoadModule('/scripts/openapi/document.ts')
  writeFileSync(`${root}docs/openapi.json`, await documentText(root))
} finally {
  await vite.close()
}
