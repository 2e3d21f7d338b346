import { readFileSync } from 'node:fs'
import { resolve } from 'node:path'
import { describe, expect, it } from 'vitest'
import { KERNELS, compileKernel } from '../../../scripts/build-kernels.mjs'
import { instantiate } from '../../../shared/engine/assembly'

describe('the compiled kernels', () => {
  it.each(KERNELS)(
    'are what their sources compile to ($source)',
    async ({ source, target }) => {
      const text = readFileSync(resolve(import.meta.dirname, '../../..', target), 'utf8')
      const bytes = [...text.matchAll(/'([0-9a-f]+)'/g)].map(([, line]) => line).join('')
      expect(bytes).toBe(await compileKernel(source))
    },
    60_000,
  )
})

describe('instantiate', () => {
  it('gives nothing for bytes that the platform refuses', () => {
    expect(instantiate('0061736d0100000000', 1)).toBeNull()
  })
})
