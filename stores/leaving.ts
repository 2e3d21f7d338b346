import { defineStore } from 'pinia'
import { ref } from 'vue'

/** The question that is asked before something typed would be lost by leaving a page. */
export const useLeavingStore = defineStore('leaving', () => {
  /** What would be lost, as it stands in the question; empty while nothing is asked. */
  const loses = ref('')
  let answerWith: ((leaves: boolean) => void) | undefined

  /** Asks the person; answers whether to leave. A newer question ends an older one as “stay”. */
  function ask(what: string): Promise<boolean> {
    answerWith?.(false)
    loses.value = what
    return new Promise((resolve) => (answerWith = resolve))
  }

  function answer(leaves: boolean): void {
    answerWith?.(leaves)
    answerWith = undefined
    loses.value = ''
  }
  return { loses, ask, answer }
})
