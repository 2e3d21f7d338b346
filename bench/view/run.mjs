// `npm run bench:view`: bundles the benchmark once and runs it in Node.
import { spawnSync } from 'node:child_process'
import { rmSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { buildSync } from 'esbuild'

const root = fileURLToPath(new URL('../..', import.meta.url))
const outfile = `${root}node_modules/.cache/bench/view-${process.pid}.mjs`

buildSync({
  absWorkingDir: root,
  entryPoints: ['bench/view/run.ts'],
  outfile,
  bundle: true,
  packages: 'external',
  platform: 'node',
  format: 'esm',
  target: 'node20',
  logLevel: 'warning',
})
const { status } = spawnSync(process.execPath, ['--enable-source-maps', outfile, ...process.argv.slice(2)], {
  cwd: root,
  stdio: 'inherit',
})
rmSync(outfile, { force: true })
process.exit(status ?? 1)
