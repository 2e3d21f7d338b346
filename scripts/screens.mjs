// `npm run screens`: pictures of every page into screens/, see scripts/screens/run.ts. Vite reads the TypeScript.
import { runnerImport } from 'vite'

const { module } = await runnerImport(new URL('screens/run.ts', import.meta.url).pathname, { configFile: false })
await module.run(process.argv.slice(2))
