import { cpSync } from 'node:fs'
import { inject } from 'vitest'
import { temporaryFolder } from './server'

function copyOf(folder: string): string {
  const copy = temporaryFolder()
  cpSync(folder, copy, { recursive: true })
  return copy
}

/** A data folder of the caller's own with a database that holds nothing yet. */
export const emptyFolder = (): string => copyOf(inject('emptyFolder'))

/** A data folder of the caller's own with the demo workspace. */
export const seededFolder = (): string => copyOf(inject('seededFolder'))
