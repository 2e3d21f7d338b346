// @vitest-environment happy-dom
import { mount, RouterLinkStub } from '@vue/test-utils'
import { describe, expect, it, vi } from 'vitest'
import * as vue from 'vue'
import type { MachineCapacity } from '../../../shared/schemas/machines'

// What Nuxt imports by itself in a component.
vi.stubGlobal('computed', vue.computed)

const parts = import.meta.glob<{ default: vue.Component }>('../../../components/ui/*.vue', { eager: true })
const components = {
  NuxtLink: RouterLinkStub,
  ...Object.fromEntries(
    Object.entries(parts).map(([path, { default: part }]) => [`Ui${path.match(/(\w+)\.vue$/)![1]}`, part]),
  ),
}

describe('Capacity', async () => {
  const { default: Capacity } = await import('../../../components/machine/Capacity.vue')
  const panel = (props: Partial<InstanceType<typeof Capacity>['$props']>) =>
    mount(Capacity, {
      props: {
        machine: { qubits: 7440, couplers: 71_736 },
        capacity: null,
        failure: null,
        busy: false,
        mayAsk: true,
        ...props,
      },
      global: { components },
    })
  const capacity: MachineCapacity = {
    calibration: 1,
    treewidth: 188,
    complete: { order: 182, chainLength: 48 },
    seed: 1,
    tries: 6,
    stoppedEarly: false,
  }
  const words = (props: Parameters<typeof panel>[0]) => panel(props).text().replace(/\s+/g, ' ')

  it('is worked out on request, by those who may', async () => {
    const wrapper = panel({})
    await wrapper.get('button').trigger('click')
    expect(wrapper.emitted('ask')).toHaveLength(1)
    expect(words({ busy: true })).toContain('Working it out')
    expect(panel({ mayAsk: false }).find('button').exists()).toBe(false)
  })

  it('tells order, chains, seed and tries, and what treewidth rules out', () => {
    const text = words({ capacity })
    expect(text).toContain('Largest complete graph by template: K182, chains of at most 48 qubits (seed 1, 6 tries).')
    expect(text).toContain('Treewidth at most 188: no complete graph of more than 189 variables can be embedded.')
    expect(text).not.toContain('Work it out')
  })

  it('says why it names none, and offers to try again where that may help', () => {
    expect(words({ capacity: { ...capacity, complete: null } })).toContain(
      'none, as no template fits this machine (seed',
    )
    const early = words({ capacity: { ...capacity, complete: null, stoppedEarly: true } })
    expect(early).toContain('none found within the time limit (seed 1, 6 tries, stopped at the time limit).')
    expect(early).toContain('Work it out')
    const failure = { status: 0, code: 'network', message: 'The server did not answer.', issues: [] }
    expect(words({ failure })).toMatch(/The server did not answer\..*Try again/)
  })
})
