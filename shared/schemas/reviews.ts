import type { SettingChange } from '../settings-changes'
import type { Person } from './common'
import type { BudgetLeft, RunSheetItem, RunSheetView } from './run-sheets'

/** A run sheet in review, with what a reviewer decides by. */
export interface ReviewItem extends RunSheetItem {
  preparedBy: Person
  /** Nobody approves what they prepared themselves. */
  isOwn: boolean
  submittedAt: string
  /** What was written to the reviewer with the submission. */
  remark: string
  price: RunSheetView['machineTime']['price']
  budget: BudgetLeft | null
  checks: { passed: number; cautions: string[]; refused: string[] }
  /** Against the submission before this one; null at the first. */
  changes: SettingChange[] | null
  /** The run sheet that it was copied from. */
  madeFrom: RunSheetView['madeFrom']
}
