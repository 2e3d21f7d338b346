import type { EditRunSheet, RunSheetView } from '#shared/schemas/run-sheets'
import type { ApiFailure } from './useApi'
import type { DraftField, RunSheetDraft } from '~/utils/run-sheet/draft'
import { DRAFT_FIELDS, draftOf, readField } from '~/utils/run-sheet/draft'

type Complaints = Partial<Record<DraftField, string>>

const without = (complaints: Complaints, fields: readonly string[]): Complaints =>
  Object.fromEntries(Object.entries(complaints).filter(([field]) => !fields.includes(field)))

/** The server's refusal, at the fields that it names. */
function complaintsOf({ message, issues }: ApiFailure): Complaints {
  const named = issues.map(({ path }) => path?.split('.')[0])
  return Object.fromEntries(DRAFT_FIELDS.filter((field) => named.includes(field)).map((field) => [field, message]))
}

/**
 * The settings of a run sheet as they are typed: saved a moment after each change, kept as typed when refused.
 * `sheet` is replaced by the server's answer, so that every figure on the page follows.
 */
export function useRunSheetDraft(sheet: Ref<RunSheetView | undefined>) {
  const { edit } = useRunSheetActions()
  const draft = ref<RunSheetDraft | null>(sheet.value ? draftOf(sheet.value) : null)
  const errors = ref<Complaints>({})
  const failure = shallowRef<ApiFailure | null>(null)
  const isSending = ref(false)

  async function send(change: EditRunSheet): Promise<boolean> {
    isSending.value = true
    const outcome = await edit(sheet.value!.id, change)
    isSending.value = false
    failure.value = outcome.ok ? null : outcome.failure
    errors.value = outcome.ok
      ? without(errors.value, Object.keys(change))
      : { ...errors.value, ...complaintsOf(outcome.failure) }
    if (outcome.ok) sheet.value = outcome.value
    return outcome.ok
  }
  const saving = useLateSaving<EditRunSheet>(send)

  const status = computed(() => {
    if (failure.value || Object.keys(errors.value).length > 0) return 'refused'
    if (isSending.value) return 'saving'
    return saving.isEmpty.value ? 'saved' : 'waiting'
  })

  /** Takes over what the server holds, except where something typed waits or was refused. */
  function follow(): void {
    if (!sheet.value) return
    const kept = DRAFT_FIELDS.filter((field) => saving.holds(field) || errors.value[field])
    draft.value = { ...draftOf(sheet.value), ...Object.fromEntries(kept.map((field) => [field, draft.value?.[field]])) }
  }
  watch(sheet, follow)

  function set<F extends DraftField>(field: F, value: RunSheetDraft[F]): void {
    if (!draft.value) return
    draft.value = { ...draft.value, [field]: value }
    failure.value = null
    errors.value = without(errors.value, [field])
    const read = readField(field, draft.value)
    if ('change' in read) return saving.add(read.change)
    errors.value = { ...errors.value, [field]: read.complaint }
    saving.drop(field)
  }

  /** Saves what waits; true when everything typed is saved. */
  async function flush(): Promise<boolean> {
    await saving.flush()
    return status.value === 'saved'
  }

  /** Drops what was typed and shows what the server holds. */
  function drop(): void {
    saving.clear()
    errors.value = {}
    failure.value = null
    follow()
  }

  return { draft, errors, failure, status, set, flush, drop }
}
