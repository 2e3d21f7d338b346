import type { InjectionKey, Ref } from 'vue'
import type { RouteLocationRaw } from 'vue-router'
import type { HelpCase, HelpRequest } from '../help/registry'

/** Shapes that pages hand to the shared parts. */

export type MarkKind = 'passed' | 'caution' | 'refused' | 'computed'

export type RunState = 'draft' | 'in review' | 'approved' | 'sent back' | 'issued' | 'returned' | 'closed'

export interface Crumb {
  label: string
  to?: RouteLocationRaw
}

export interface Fact {
  label: string
  value: string | number
  /** Set smaller after the value: `µs`. */
  unit?: string
  /** A few words after it: `of 667`. */
  note?: string
  mark?: MarkKind | RunState
  /** The value is a word rather than a number. */
  word?: boolean
  /** How the value is computed, asked for by its label. */
  help?: HelpRequest
  /** Where each of several has its own: the chains of a strength. */
  cases?: () => readonly HelpCase[]
  casesOf?: string
  /** Reads after “How” and before “is computed”, where the label alone would not. */
  name?: string
}

export type StageState = 'done' | 'under way' | 'not yet'

export interface WireStage {
  label: string
  note?: string
  state: StageState
  to?: RouteLocationRaw
}

export interface Issue {
  line?: number
  path?: string
  message: string
}

export interface Choice {
  value: string | number
  label: string
  /** A few words after the label. */
  note?: string
  disabled?: boolean
}

export interface MenuItem {
  key: string
  label: string
  note?: string
  to?: RouteLocationRaw
  /** A file or another site rather than a page. */
  href?: string
  disabled?: boolean
  /** It opens a dialog and does nothing by itself. */
  opensDialog?: boolean
  /** Undoes much: shown in clay, after a rule. */
  undo?: boolean
}

export interface Sort {
  field: string
  direction: 'ascending' | 'descending'
}

/** What a field tells the control inside it. */
export interface FieldContext {
  id: string
  describedBy: Ref<string | undefined>
  invalid: Ref<boolean>
  required: Ref<boolean>
  /** What the control itself found wrong with the text typed into it. */
  report: (problem: string) => void
}

export const fieldKey: InjectionKey<FieldContext> = Symbol('field')

const RUN_STATES: readonly string[] = ['draft', 'in review', 'approved', 'sent back', 'issued', 'returned', 'closed']

export function isRunState(mark: MarkKind | RunState): mark is RunState {
  return RUN_STATES.includes(mark)
}

/** Where a click on a heading leads: the other way if it was sorted by already, else the field's own first direction. */
export function nextSort(current: Sort | undefined, field: string, first: Sort['direction']): Sort {
  if (current?.field !== field) return { field, direction: first }
  return { field, direction: current.direction === 'ascending' ? 'descending' : 'ascending' }
}

/** Reads a number as people type it: spaces between thousands and a true minus are allowed, a decimal comma is not. */
export function parseTyped(text: string): number | null {
  const plain = text.replace(/[\s\u2009\u202f]/g, '').replace('\u2212', '-')
  if (plain === '') return null
  return /^[+-]?(\d+\.?\d*|\.\d+)(e[+-]?\d+)?$/i.test(plain) ? Number(plain) : Number.NaN
}
