// `npm test`: formatting, lint, types, then every test, and one closing line that counts them.
import { spawnSync } from 'node:child_process'
import { mkdtempSync, readFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'

const cwd = fileURLToPath(new URL('..', import.meta.url))
const report = join(mkdtempSync(join(tmpdir(), 'espalier-report-')), 'tests.json')

const CHECKS = [
  ['Formatting', ['npm', 'run', '--silent', 'format:check']],
  ['Lint', ['npm', 'run', '--silent', 'lint']],
  ['Types', ['npm', 'run', '--silent', 'typecheck']],
  ['Unused code', ['npm', 'run', '--silent', 'unused']],
]

let passed = 0
let failed = 0

for (const [name, [command, ...args]] of CHECKS) {
  const started = Date.now()
  const { status, stdout, stderr } = spawnSync(command, args, { cwd, encoding: 'utf8' })
  const seconds = Math.round((Date.now() - started) / 1000)
  console.log(`${status === 0 ? '✓' : '✕'} ${name} (${seconds} s)`)
  if (status === 0) passed++
  else {
    failed++
    console.log(stdout, stderr)
  }
}

const { status } = spawnSync(
  'npx',
  ['vitest', 'run', '--reporter=default', '--reporter=json', `--outputFile.json=${report}`],
  {
    cwd,
    stdio: ['ignore', 'inherit', 'inherit'],
  },
)
const results = JSON.parse(readFileSync(report, 'utf8'))
passed += results.numPassedTests
// A file that could not be loaded counts as one failure: its tests are in no other number.
const unloaded = results.testResults.filter(
  (file) => file.status === 'failed' && file.assertionResults.every((test) => test.status !== 'failed'),
).length
failed += results.numFailedTests + unloaded
if (status !== 0 && failed === 0) failed = 1

console.log(`${passed} passed, ${failed} failed`)
process.exit(failed === 0 ? 0 : 1)
