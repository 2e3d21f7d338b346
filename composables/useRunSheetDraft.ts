import type { EditRunSheet, RunSheetView } from '#shared/schemas/run-sheets'
import type { ApiFailure } from './useApi'
import type { DraftField, RunSheetDraft } from '~/utils/run-sheet/draft'
import { DRAFT_FIELDS, draftOf, readField } from '~/utils/run-sheet/draft'

const WAIT_MS = 600

/**
 * The settings of a run sheet as they are typed: saved a moment after each change, kept as typed when refused.
 * `sheet` is replaced by the server's answer, so that every figure on the page follows.
 */
export function useRunSheetDraft(sheet: Ref<RunSheetView | undefined>) {
  const { edit } = useRunSheetActions()
  const draft = ref<RunSheetDraft | null>(sheet.value ? draftOf(sheet.value) : null)
  const errors = ref<Partial<Record<DraftField, string>>>({})
  const failure = shallowRef<ApiFailure | null>(null)
  const status = ref<'saved' | 'waiting' | 'saving' | 'refused'>('saved')
  let pending: EditRunSheet = {}
  let timer: ReturnType<typeof setTimeout> | undefined
  let saving: Promise<void> | null = null

  const isKept = (field: DraftField): boolean => field in pending || errors.value[field] !== undefined

  /** Takes over what the server holds, except where something typed waits or was refused. */
  function follow(): void {
    if (!sheet.value) return
    const held = draftOf(sheet.value)
    const kept = Object.fromEntries(DRAFT_FIELDS.filter(isKept).map((field) => [field, draft.value?.[field]]))
    draft.value = { ...held, ...kept }
  }
  watch(sheet, follow)

  function settle(): void {
    const complaints = Object.values(errors.value).some(Boolean)
    status.value = complaints || failure.value ? 'refused' : Object.keys(pending).length > 0 ? 'waiting' : 'saved'
  }

  function set<F extends DraftField>(field: F, value: RunSheetDraft[F]): void {
    if (!draft.value) return
    draft.value = { ...draft.value, [field]: value }
    const read = readField(field, draft.value)
    const { [field]: _old, ...others } = errors.value
    if ('complaint' in read) {
      errors.value = { ...others, [field]: read.complaint }
      const { [field]: _dropped, ...rest } = pending
      pending = rest
    } else {
      errors.value = others
      pending = { ...pending, ...read.change }
    }
    failure.value = null
    settle()
    clearTimeout(timer)
    timer = setTimeout(() => void flush(), WAIT_MS)
  }

  async function send(id: string, change: EditRunSheet): Promise<void> {
    status.value = 'saving'
    const outcome = await edit(id, change)
    if (outcome.ok) {
      errors.value = Object.fromEntries(Object.entries(errors.value).filter(([field]) => !(field in change)))
      sheet.value = outcome.value
      return
    }
    failure.value = outcome.failure
    pending = { ...change, ...pending }
    const places = outcome.failure.issues.map(({ path }) => path?.split('.')[0])
    for (const field of DRAFT_FIELDS)
      if (places.includes(field)) errors.value = { ...errors.value, [field]: outcome.failure.message }
  }

  async function sendAll(): Promise<void> {
    while (sheet.value && Object.keys(pending).length > 0 && !failure.value) {
      const change = pending
      pending = {}
      await send(sheet.value.id, change)
    }
    settle()
  }

  /** Saves what waits; true when everything typed is saved. */
  async function flush(): Promise<boolean> {
    clearTimeout(timer)
    saving ??= sendAll().finally(() => {
      saving = null
    })
    await saving
    return status.value === 'saved'
  }

  /** Drops what was typed and shows what the server holds. */
  function drop(): void {
    clearTimeout(timer)
    pending = {}
    errors.value = {}
    failure.value = null
    follow()
    settle()
  }

  onBeforeUnmount(() => void flush())
  return { draft, errors, failure, status, set, flush, drop }
}
