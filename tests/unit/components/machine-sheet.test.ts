// @vitest-environment happy-dom
import { mount, RouterLinkStub } from '@vue/test-utils'
import { describe, expect, it, vi } from 'vitest'
import * as vue from 'vue'

// What Nuxt imports by itself in a component.
for (const name of ['computed', 'ref', 'shallowRef', 'watch'] as const) vi.stubGlobal(name, vue[name])

const parts = import.meta.glob<{ default: vue.Component }>('../../../components/ui/*.vue', { eager: true })
const components = {
  NuxtLink: RouterLinkStub,
  MachineEnergyChart: {
    props: ['curves', 'temperatureMillikelvin'],
    template: '<p>chart of {{ curves[0].table.s.length }} rows</p>',
  },
  ...Object.fromEntries(
    Object.entries(parts).map(([path, { default: part }]) => [`Ui${path.match(/(\w+)\.vue$/)![1]}`, part]),
  ),
}
const words = (text: string) => text.replace(/\s+/g, ' ')

/** A component whose `v-model` is kept as a page would. */
function field(component: vue.Component, props: object, text: string) {
  const model = vue.ref(text)
  const wrapper = mount(
    {
      render: () =>
        vue.h(component, {
          ...props,
          modelValue: model.value,
          'onUpdate:modelValue': (next: string) => (model.value = next),
        }),
    },
    { global: { components } },
  )
  const drop = async (name: string, contents: string) => {
    wrapper.findComponent({ name: 'FileDrop' }).vm.$emit('file', new File([contents], name))
    await new Promise((resolve) => setTimeout(resolve, 20))
    await vue.nextTick()
  }
  return { wrapper, model, drop, said: () => words(wrapper.text()) }
}

describe('EnergyField', async () => {
  const { default: EnergyField } = await import('../../../components/machine/EnergyField.vue')
  const energies = (text: string) => field(EnergyField, { temperatureMillikelvin: 13.1 }, text)

  it('draws what it understood, and says what it converted', () => {
    const { said } = energies('s,A (MHz),B (GHz)\n0,9000,0\n1,0,12')
    expect(said()).toContain('Understood: 2 rows.')
    expect(said()).toContain('A converted from MHz to GHz')
    expect(said()).toContain('chart of 2 rows')
  })

  it('names each wrong line and draws nothing', async () => {
    const { said, drop } = energies('')
    expect(said()).toContain('No table')
    await drop('table.csv', '0,9,0\n0.5,9.5,1\n0.9,0,12')
    expect(said()).toContain('line 2A rises from 9 to 9.5 GHz')
    expect(said()).toContain('line 3the last row must be s = 1, not 0.9')
    expect(said()).not.toContain('chart of')
  })
})

describe('DefectsField', async () => {
  const { default: DefectsField } = await import('../../../components/machine/DefectsField.vue')

  it('reads two columns as couplers, or as qubits when told', async () => {
    const { model, drop, wrapper, said } = field(DefectsField, {}, '3')
    await drop('lost.csv', 'a,b\n4,9\n5,6\n')
    expect(model.value).toBe('# a,b\n4-9\n5-6')
    expect(said()).toContain('Understood: no qubits and 2 couplers missing.')
    await wrapper
      .findAll('button')
      .find((button) => button.text() === 'Take them as qubits')!
      .trigger('click')
    expect(model.value).toBe('# a,b\n4,9\n5,6')
    expect(said()).toContain('Take them as couplers')
  })

  it('keeps what was typed when a file cannot be read, and says where', async () => {
    const { model, drop, said } = field(DefectsField, {}, '3, 3')
    expect(said()).toContain('1 entry is repeated')
    await drop('lost.json', '{"qubits": [1, "x"]}')
    expect(model.value).toBe('3, 3')
    expect(said()).toContain('qubits[1]is not a qubit number')
    await drop('lost.json', '{"qubits": [1], "couplers": [[2, 4]]}')
    expect(model.value).toBe('1\n2-4')
  })
})
