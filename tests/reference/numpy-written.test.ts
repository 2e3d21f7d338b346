import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { expect, it } from 'vitest'
import type { ProblemDocument } from '../../shared/engine/formats/format'
import { readProblem, writeProblem } from '../../shared/engine/formats/index'
import { buildProblem } from '../../shared/engine/problem/build'

/*
 * Files of ours for Python. tests/fixtures/numpy/check.py loads the stored ones with NumPy and SciPy, whose versions are in
 * its output, and compares them with the same values written out there; run by hand, since Python is not needed otherwise.
 * STORE_WRITTEN_FILES=1 stores them anew.
 */
const folder = join(import.meta.dirname, '../fixtures/numpy/written')

const terms = { rows: [0, 1, 0, 2], cols: [0, 1, 2, 1], values: [0.1, -3, 1.5, 2 ** -30] }
const documents: Record<string, ProblemDocument> = {
  'labelled.npz': {
    form: 'ising',
    sense: 'max',
    labels: ['north berth', '渡し船 🚢', 'é'],
    problem: buildProblem(3, terms, -2.5).problem,
  },
  'counted.npz': { form: 'qubo', sense: 'min', labels: ['0', '1', '2'], problem: buildProblem(3, terms, 7).problem },
  'bare.npy': { form: 'qubo', sense: 'min', labels: ['0', '1', '2'], problem: buildProblem(3, terms, 0).problem },
}

it.each(Object.entries(documents))('%s is the file that Python was shown', (name, document) => {
  const path = join(folder, name)
  const bytes = writeProblem(name.slice(-3), document)
  if (process.env.STORE_WRITTEN_FILES) writeFileSync(path, bytes)
  expect(Buffer.from(bytes).equals(readFileSync(path))).toBe(true)
  expect(readProblem(readFileSync(path))).toMatchObject({ ...document, issues: [] })
})
