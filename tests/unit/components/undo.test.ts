// @vitest-environment happy-dom
import { mount, RouterLinkStub } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import UiDelete from '../../../components/ui/Delete.vue'
import UiUndo from '../../../components/ui/Undo.vue'

const global = { components: { NuxtLink: RouterLinkStub } }
const START = 1_000_000

describe('UiUndo', () => {
  beforeEach(() => vi.useFakeTimers({ now: START }))
  afterEach(() => {
    vi.useRealTimers()
    document.body.innerHTML = ''
  })

  const make = (props: Record<string, unknown> = {}) =>
    mount(UiUndo, {
      props: { label: 'P-3, Deck radio', until: START + 60_000, ...props },
      global,
      attachTo: document.body,
    })
  const pass = async (milliseconds: number) => {
    await vi.advanceTimersByTimeAsync(milliseconds)
  }

  it('says what was deleted, offers to undo it, and goes after its time', async () => {
    const line = make()
    await pass(400)
    expect(line.text()).toContain('Deleted P-3, Deck radio.')
    ;(document.activeElement as HTMLElement).blur()
    await line.get('button').trigger('click')
    expect(line.emitted('undo')).toHaveLength(1)
    await pass(9000)
    expect(line.emitted('over')).toBeUndefined()
    await pass(1500)
    expect(line.emitted('over')).toBeDefined()
  })

  it('takes a lost focus, and none that a person has placed', async () => {
    const lost = make()
    await pass(400)
    expect(document.activeElement).toBe(lost.get('button').element)
    lost.unmount()
    const elsewhere = document.body.appendChild(document.createElement('button'))
    elsewhere.focus()
    make()
    await pass(400)
    expect(document.activeElement).toBe(elsewhere)
  })

  it('waits while the pointer rests on it, but no longer than the server keeps it', async () => {
    document.body.appendChild(document.createElement('button')).focus()
    const line = make()
    await line.trigger('pointerenter')
    await pass(30_000)
    expect(line.emitted('over')).toBeUndefined()
    await pass(31_000)
    expect(line.emitted('over')).toBeDefined()
  })

  it('keeps silent behind a dialog', async () => {
    const line = make()
    document.body.firstElementChild!.setAttribute('aria-hidden', 'true')
    await pass(400)
    expect(line.text()).not.toContain('Deleted')
    document.body.firstElementChild!.removeAttribute('aria-hidden')
    await pass(400)
    expect(line.text()).toContain('Deleted')
  })

  it('leads to what came back, and says why it did not', async () => {
    const line = make({ state: 'restored', to: '/problems/x' })
    await pass(400)
    expect(line.text()).toContain('P-3, Deck radio is back.')
    expect(line.getComponent(RouterLinkStub).props('to')).toBe('/problems/x')
    await line.setProps({ state: 'failed', failure: 'The server did not answer.' })
    expect(line.text()).toContain('could not be brought back. The server did not answer.')
  })
})

describe('UiDelete', () => {
  afterEach(() => (document.body.innerHTML = ''))

  it('deletes at once where nothing else goes with it', async () => {
    const part = mount(UiDelete, { props: { label: 'Delete draft', title: 'Delete RS-1?' } })
    await part.get('button').trigger('click')
    expect(part.emitted('remove')).toHaveLength(1)
  })

  it('asks first where something does, and says what', async () => {
    const part = mount(UiDelete, {
      props: { label: 'Delete draft', title: 'Delete RS-1?', companions: ['2 sets of samples'] },
      attachTo: document.body,
      global,
    })
    await part.get('button').trigger('click')
    expect(part.emitted('remove')).toBeUndefined()
    const dialog = document.querySelector('[role=dialog]')!
    expect(dialog.textContent).toContain('2 sets of samples')
    ;[...dialog.querySelectorAll('button')].find((button) => button.textContent === 'Delete draft')!.click()
    expect(part.emitted('remove')).toHaveLength(1)
    part.unmount()
  })
})
