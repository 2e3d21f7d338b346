import { watchSubmitted } from '~/utils/ui/firstWrong'

/** In every form the focus goes to the first wrong field once it was sent. */
export default defineNuxtPlugin(() => {
  let stop: (() => void) | undefined
  document.addEventListener('submit', ({ target }) => {
    stop?.()
    stop = target instanceof HTMLElement ? watchSubmitted(target) : undefined
  })
})
