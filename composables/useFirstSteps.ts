import type { FirstStepsView } from '#shared/schemas/first-steps'

const YEAR_SECONDS = 31_536_000

/** Whether the first steps are shown on this device: a choice, or none yet. */
export const useFirstStepsChoice = () =>
  useCookie<'shown' | 'away' | null>('espalier-first-steps', {
    default: () => null,
    maxAge: YEAR_SECONDS,
    sameSite: 'lax',
  })

/** The first steps: shown unasked in the demo workspace, else once asked for, to those who may take them. */
export async function useFirstSteps() {
  const choice = useFirstStepsChoice()
  const { may } = useSession()
  const mayTake = computed(() => may('developer', 'owner'))
  const { data } = await useResource<FirstStepsView>('/api/first-steps')
  const isShown = computed(
    () =>
      mayTake.value && data.value !== undefined && (choice.value ?? (data.value.demo ? 'shown' : 'away')) === 'shown',
  )
  return { done: computed(() => data.value?.done ?? null), isShown, putAway: () => (choice.value = 'away') }
}
