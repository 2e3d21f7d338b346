// @vitest-environment happy-dom
import { flushPromises, mount } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it } from 'vitest'
import { defineComponent, h, ref } from 'vue'
import { createMemoryHistory, createRouter, RouterView } from 'vue-router'
import { useUnsaved } from '../../../composables/useUnsaved'
import { useLeavingStore } from '../../../stores/leaving'

const typed = ref('')

async function open(options?: { keptWithin: boolean }) {
  const form = defineComponent({
    setup() {
      useUnsaved(() => typed.value !== '', 'the remark', options)
      return () => h('p', 'form')
    },
  })
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [
      { path: '/form/:id?', component: form },
      { path: '/', component: { render: () => h('p', 'list') } },
    ],
  })
  await router.push('/form')
  const wrapper = mount(RouterView, { global: { plugins: [router] }, attachTo: document.body })
  await flushPromises()
  return { router, wrapper }
}

/** Whether the browser would ask before it reloads or closes. */
function asksBeforeUnload(): boolean {
  return !window.dispatchEvent(new Event('beforeunload', { cancelable: true }))
}

describe('useUnsaved', () => {
  beforeEach(() => {
    setActivePinia(createPinia())
    typed.value = ''
  })

  it('lets go where nothing was typed', async () => {
    const { router, wrapper } = await open()
    expect(asksBeforeUnload()).toBe(false)
    await router.push('/')
    expect(wrapper.text()).toBe('list')
    wrapper.unmount()
  })

  it('asks what would be lost, and stays or goes as told', async () => {
    const { router, wrapper } = await open()
    const leaving = useLeavingStore()
    typed.value = 'Too many reads'
    expect(asksBeforeUnload()).toBe(true)

    const stays = router.push('/')
    await flushPromises()
    expect(leaving.loses).toBe('the remark')
    leaving.answer(false)
    await stays
    expect(wrapper.text()).toBe('form')
    expect(leaving.loses).toBe('')

    const goes = router.push('/')
    await flushPromises()
    leaving.answer(true)
    await goes
    expect(wrapper.text()).toBe('list')
    expect(asksBeforeUnload()).toBe(false)
    wrapper.unmount()
  })

  it('asks before another thing of the same kind, and not for a mere change of the query', async () => {
    const { router, wrapper } = await open()
    typed.value = 'x'
    await router.push('/form?lens=load')
    expect(router.currentRoute.value.query).toEqual({ lens: 'load' })
    const other = router.push('/form/2')
    await flushPromises()
    expect(useLeavingStore().loses).toBe('the remark')
    useLeavingStore().answer(false)
    await other
    expect(router.currentRoute.value.path).toBe('/form')
    wrapper.unmount()
  })

  it('asks only before reloading where the text outlives the page', async () => {
    const { router, wrapper } = await open({ keptWithin: true })
    typed.value = 'x'
    expect(asksBeforeUnload()).toBe(true)
    await router.push('/')
    expect(wrapper.text()).toBe('list')
    wrapper.unmount()
  })

  it('a newer question ends an older one as “stay”', async () => {
    const leaving = useLeavingStore()
    const first = leaving.ask('one')
    const second = leaving.ask('two')
    leaving.answer(true)
    expect(await Promise.all([first, second])).toEqual([false, true])
  })
})
