/**
 * Compiles kernels/*.as with AssemblyScript (their own ending keeps TypeScript's tools off them) and writes the bytes, as hexadecimal text, into the engine:
 *
 *     node scripts/build-kernels.mjs
 *
 * The engine reads no files, so its kernels travel inside it. A unit test compiles them again and compares.
 */
import { readFileSync, writeFileSync } from 'node:fs'
import { dirname, resolve } from 'node:path'
import { fileURLToPath } from 'node:url'
import asc from 'assemblyscript/asc'

const root = resolve(dirname(fileURLToPath(import.meta.url)), '..')

/** Source and target of each kernel, from the root. */
export const KERNELS = [
  { source: 'kernels/growth.as', target: 'shared/engine/embedding/chains/growth-bytes.ts' },
  { source: 'kernels/sweep-16.as', target: 'shared/engine/sampling/lanes/sweep-16-bytes.ts' },
  { source: 'kernels/sweep-32.as', target: 'shared/engine/sampling/lanes/sweep-32-bytes.ts' },
]

/** The compiled kernel as hexadecimal text. */
export async function compileKernel(source) {
  const options = ['-O3', '--noAssert', '--runtime', 'stub', '--initialMemory', '1', '--enable', 'simd']
  let bytes = new Uint8Array()
  const { error, stderr } = await asc.main(['kernel.ts', ...options, '--outFile', 'kernel.wasm'], {
    readFile: (name) => (name === 'kernel.ts' ? readFileSync(resolve(root, source), 'utf8') : null),
    writeFile: (name, contents) => {
      if (name === 'kernel.wasm') bytes = contents
    },
  })
  if (error) throw new Error(`${source}: ${stderr.toString()}`, { cause: error })
  return Buffer.from(bytes).toString('hex')
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  for (const { source, target } of KERNELS) {
    const hex = await compileKernel(source)
    const lines = hex.match(/.{1,100}/g).map((line) => `  '${line}',`)
    const text = `/** Compiled from ${source} by scripts/build-kernels.mjs; not written by hand. */\nexport const BYTES = [\n${lines.join('\n')}\n].join('')\n`
    writeFileSync(resolve(root, target), text)
    console.log(`${source}: ${hex.length / 2} bytes`)
  }
}
