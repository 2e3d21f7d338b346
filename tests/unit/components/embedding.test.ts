// @vitest-environment happy-dom
import { flushPromises, mount, RouterLinkStub } from '@vue/test-utils'
import { createPinia, setActivePinia } from 'pinia'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import * as vue from 'vue'
import type { EmbeddingView, UnmetView } from '../../../shared/schemas/embeddings'
import type { EmbeddingOfProblem } from '../../../shared/schemas/problems'
import { useSelectionStore } from '../../../stores/selection'
import { useSortedRows } from '../../../composables/useSortedRows'

// What Nuxt imports by itself in a component.
vi.stubGlobal('useSelectionStore', useSelectionStore)
vi.stubGlobal('useSortedRows', useSortedRows)
for (const name of ['computed', 'markRaw', 'reactive', 'ref', 'watch'] as const) vi.stubGlobal(name, vue[name])

const parts = import.meta.glob<{ default: vue.Component }>('../../../components/ui/*.vue', { eager: true })
const own = import.meta.glob<{ default: vue.Component }>(
  '../../../components/embedding/{Advice,CompareSort,MethodChoice,Unmet}.vue',
  {
    eager: true,
  },
)
const named = (prefix: string, modules: Record<string, { default: vue.Component }>) =>
  Object.entries(modules).map(([path, { default: part }]) => [prefix + path.match(/(\w+)\.vue$/)![1], part])
const global = {
  components: {
    NuxtLink: RouterLinkStub,
    ...Object.fromEntries([...named('Ui', parts), ...named('Embedding', own)]),
  },
}

beforeEach(() => setActivePinia(createPinia()))

describe('SearchForm', async () => {
  const { default: SearchForm } = await import('../../../components/embedding/SearchForm.vue')
  const form = () =>
    mount(SearchForm, { props: { freshSeed: 4, failure: null, busy: false }, global, attachTo: document.body })

  it('starts with what is set, the less used settings out of sight', async () => {
    const wrapper = form()
    expect(wrapper.get('details').attributes('open')).toBeUndefined()
    expect(wrapper.get('summary').text()).toContain('seed 4, 8 tries')
    await wrapper.get('input[type=radio][value=lines]').trigger('change')
    await wrapper.get('form').trigger('submit')
    expect(wrapper.emitted('start')?.[0]?.[0]).toMatchObject({ method: 'lines', seed: 4, timeLimitSeconds: 30 })
  })

  it('unfolds the settings that hold an error, and keeps what was typed beside a proof', async () => {
    const wrapper = form()
    const tries = wrapper.findAll('details input').at(1)!
    await tries.setValue('0')
    await wrapper.get('form').trigger('submit')
    expect(wrapper.emitted('start')).toBeUndefined()
    expect(wrapper.get('details').attributes('open')).toBe('')
    expect(wrapper.get('[role=alert]').text()).toContain('lies from 1 to')
    const failure = { status: 422, code: 'embedding.infeasible', message: 'The problem has 9 variables.', issues: [] }
    await wrapper.setProps({ failure })
    expect(wrapper.text()).toMatch(/Proved: no embedding exists on this machine\.\s+The problem has 9 variables\./)
    expect((tries.element as HTMLInputElement).value).toBe('0')
  })
})

describe('Compare', async () => {
  const { default: Compare } = await import('../../../components/embedding/Compare.vue')
  const row = (number: number, max: number, chosen = false) =>
    ({
      id: `e${number}`,
      number,
      status: 'found',
      machineId: 'alder',
      calibration: 2,
      method: 'auto',
      methodUsed: 'search',
      seed: number,
      chosen,
      seconds: 1,
      stats: { qubitsUsed: 10 * max, chainLength: { max, mean: max, min: 1 }, unusedShare: 0.5 },
    }) as EmbeddingOfProblem
  const table = (mayChoose = true) =>
    mount(Compare, {
      props: {
        embeddings: [row(1, 5, true), row(2, 4)],
        machine: { id: 'alder', name: 'Alder' },
        variables: 9,
        current: 'e2',
        mayChoose,
      },
      global,
    })
  const numbers = (wrapper: ReturnType<typeof table>) =>
    wrapper.findAll('tbody tr').map((line) => line.get('th').text())

  it('sorts by the longest chain, says which is best in words and links to the others', async () => {
    const wrapper = table()
    expect(numbers(wrapper)).toEqual(['E-2', 'E-1, chosen'])
    const [first, second] = wrapper.findAll('tbody tr')
    expect(first!.findAll('td')[0]!.text()).toBe('best 4')
    expect(second!.findAll('td')[0]!.text()).toBe('5')
    expect(first!.text()).toContain('this page')
    expect(second!.getComponent(RouterLinkStub).props('to')).toBe('/embeddings/e1')
    await wrapper.findAll('thead button')[1]!.trigger('click')
    expect(numbers(wrapper)).toEqual(['E-1, chosen', 'E-2'])
  })

  it('marks another one, takes the mark away, and leaves readers without either', async () => {
    const wrapper = table()
    await wrapper.findAll('input[type=radio]')[0]!.trigger('change')
    await wrapper.findAll('button').at(-1)!.trigger('click')
    expect(wrapper.emitted('choose')).toEqual([
      ['e2', true],
      ['e1', false],
    ])
    const readers = table(false)
    expect(readers.findAll('input:not(:disabled)')).toHaveLength(0)
    expect(readers.text()).not.toContain('Remove the mark')
  })
})

describe('Improve', async () => {
  const { default: Improve } = await import('../../../components/embedding/Improve.vue')
  const labels = ['a', 'b', 'c']
  const CURRENT: EmbeddingView['ofVersion'] = { version: 2, current: 2, graph: null }
  const panel = (holds: boolean, ofVersion = CURRENT) =>
    mount(Improve, {
      props: {
        embedding: { problem: { id: 'p1' }, holdsAtCurrentCalibration: holds, ofVersion } as EmbeddingView,
        labels,
        problems: [],
        failure: null,
        busy: false,
      },
      global,
    })
  const button = (wrapper: ReturnType<typeof panel>, text: string) =>
    wrapper.findAll('button').find((found) => found.text() === text)

  it('keeps the selected chains as they are', async () => {
    const wrapper = panel(true)
    expect(button(wrapper, 'Repair')).toBeUndefined()
    useSelectionStore().select([2, 0])
    await flushPromises()
    expect(wrapper.text()).toContain('Keep the 2 selected chains as they are')
    await button(wrapper, 'Shorten')!.trigger('click')
    await wrapper.get('input[type=checkbox]').setValue(false)
    await button(wrapper, 'Shorten')!.trigger('click')
    const start = { problemId: 'p1', work: 'shorten', timeLimitSeconds: 30 }
    expect(wrapper.emitted('start')).toEqual([[{ ...start, frozen: ['a', 'c'] }], [{ ...start, frozen: [] }]])
  })

  it('offers repair where the embedding no longer holds', async () => {
    const wrapper = panel(false)
    expect(button(wrapper, 'Shorten')).toBeUndefined()
    expect(wrapper.text()).not.toContain('Shorten')
    await button(wrapper, 'Repair')!.trigger('click')
    expect(wrapper.emitted('start')?.[0]).toEqual([
      { problemId: 'p1', work: 'repair', frozen: [], timeLimitSeconds: 30 },
    ])
  })

  it('carries an embedding of an earlier version over, and shortens none whose interactions changed', async () => {
    const wrapper = panel(true, { version: 1, current: 2, graph: 'changed' })
    expect(button(wrapper, 'Shorten')).toBeUndefined()
    await button(wrapper, 'Carry over to version 2')!.trigger('click')
    expect(wrapper.emitted('start')?.[0]).toMatchObject([{ problemId: 'p1', work: 'repair' }])
  })
})

describe('Unfound', async () => {
  const { default: Unfound } = await import('../../../components/embedding/Unfound.vue')
  const outcome = (proved: boolean, partialChains: Record<string, number[]>) =>
    mount(Unfound, {
      props: {
        embedding: {
          id: 'e1',
          status: 'none found',
          problem: { id: 'p1' },
          machine: { id: 'm1', qubits: 9 },
          method: 'auto',
          seed: 4,
          tries: 8,
          timeLimitSeconds: 30,
          objective: 'longest chain',
          target: { longestChain: null, totalQubits: null },
          unmet: {
            message: 'There is none. Why.',
            proved,
            overlap: 1,
            overlappedQubits: [20],
            variables: [],
            unmetInteractions: 0,
            neededQubits: null,
            advice: [{ kind: 'another try', message: 'Another try may do.', variables: [], interactions: [] }],
            partialChains,
          },
        } as unknown as EmbeddingView,
        lattice: null,
        maySearch: true,
        busy: false,
      },
      global: { ...global, stubs: { ClientOnly: true, EmbeddingPartialLattice: true } },
    })

  it('offers another search, with the tries of each method', () => {
    const text = outcome(false, { a: [20], b: [20] }).text()
    expect(text).toContain('Search again')
    expect(text).toContain('Seed 5, 16 tries of each method, at most')
    expect(text).toContain('What stood in the way')
  })

  it('offers none where it is proved that there is no embedding, nor tells of a state that is not there', () => {
    const text = outcome(true, {}).text()
    expect(text).not.toContain('Search again')
    expect(text).not.toContain('Another try')
    expect(text).not.toContain('What stood in the way')
    expect(text).toContain('A larger machine leaves more room.')
  })
})

describe('Unmet', async () => {
  const { default: Unmet } = await import('../../../components/embedding/Unmet.vue')
  it('lists the variables as buttons and tells whose chains the one in focus shares qubits with', async () => {
    const unmet = {
      overlap: 1,
      overlappedQubits: [20],
      variables: ['a', 'b'],
      unmetInteractions: 0,
      neededQubits: 1279,
      partialChains: { a: [10, 20], b: [20] },
    } as unknown as UnmetView
    const wrapper = mount(Unmet, { props: { unmet, qubits: 666, focused: null } })
    await wrapper.findAll('button')[1]!.trigger('click')
    expect(wrapper.emitted('focus')).toEqual([['b']])
    await wrapper.setProps({ focused: 'b' })
    expect(wrapper.findAll('button').map((found) => found.attributes('aria-pressed'))).toEqual(['false', 'true'])
    expect(wrapper.get('[aria-live]').text()).toMatch(/^b\s*: a chain of 1 qubit, sharing some with a\.$/)
  })
})
