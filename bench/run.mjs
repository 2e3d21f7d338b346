// `node bench/run.mjs NAME [options]`: bundles bench/NAME/run.ts once and runs it in Node.
import { spawnSync } from 'node:child_process'
import { rmSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { buildSync } from 'esbuild'

const root = fileURLToPath(new URL('..', import.meta.url))
const [name, ...options] = process.argv.slice(2)
const outfile = `${root}node_modules/.cache/bench/${name}-${process.pid}.mjs`

buildSync({
  absWorkingDir: root,
  entryPoints: [`bench/${name}/run.ts`],
  outfile,
  bundle: true,
  packages: 'external',
  platform: 'node',
  format: 'esm',
  target: 'node20',
  logLevel: 'warning',
})
const { status } = spawnSync(process.execPath, ['--enable-source-maps', outfile, ...options], {
  cwd: root,
  stdio: 'inherit',
})
rmSync(outfile, { force: true })
process.exit(status ?? 1)
