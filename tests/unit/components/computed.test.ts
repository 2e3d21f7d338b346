// @vitest-environment happy-dom
import { flushPromises, mount } from '@vue/test-utils'
import { afterEach, describe, expect, it } from 'vitest'
import UiComputed from '../../../components/ui/Computed.vue'
import UiExplanation from '../../../components/ui/Explanation.vue'
import UiFacts from '../../../components/ui/Facts.vue'
import type { HelpRequest } from '../../../utils/help/registry'
import { THIN_SPACE } from '../../../utils/format'
import { explain } from '../../../utils/help/registry'

const density: HelpRequest = { id: 'density', given: { variables: 40, interactions: 175 } }
const noise: HelpRequest = {
  id: 'energyNoise',
  given: { qubits: 9, couplers: 16, sigmaH: 1, sigmaJ: 1, scale: 0.5 },
}

afterEach(() => (document.body.innerHTML = ''))

/** The popover is fetched when it is first asked for. */
async function opened() {
  for (let k = 0; k < 50 && !document.querySelector('[role=dialog]'); k++) {
    await new Promise((resolve) => setTimeout(resolve, 20))
    await flushPromises()
  }
  return document.querySelector('[role=dialog]')!
}

describe('UiComputed', () => {
  it.each([
    [{ label: 'Density' }, 'How density is computed'],
    [{ label: 'J under 2σ' }, 'How J under 2σ is computed'],
    [{ label: 'Qubits used', name: 'the number of qubits used' }, 'How the number of qubits used is computed'],
    [{ label: '14.16', name: 'k by Cut bound' }, 'How k by Cut bound is computed: 14.16'],
    [{ label: 'Read', name: 'the number of reads' }, 'How the number of reads is computed: Read'],
  ])('is named by what it explains, what is seen included: %o', (props, name) => {
    const button = mount(UiComputed, { props: { ...props, help: density } }).get('button')
    expect(button.attributes('aria-label')).toBe(name)
    expect(button.text()).toBe(props.label)
    expect(button.attributes('aria-expanded')).toBe('false')
  })

  it('opens formula, inputs and source, and closes again', async () => {
    const wrapper = mount(UiComputed, { props: { label: 'Density', help: density }, attachTo: document.body })
    await wrapper.get('button').trigger('click')
    const dialog = await opened()
    expect(dialog.getAttribute('aria-label')).toBe('How density is computed')
    expect(dialog.textContent).toContain(`22.4${THIN_SPACE}%`)
    expect(dialog.textContent).toContain('interactions')
    expect(dialog.querySelector('math mfrac')).not.toBeNull()
    expect(wrapper.get('button').attributes('aria-expanded')).toBe('true')
    await wrapper.get('button').trigger('click')
    expect(wrapper.get('button').attributes('aria-expanded')).toBe('false')
    wrapper.unmount()
  })

  it('offers the cases of a column, and leaves the row it stands in alone', async () => {
    const cases = () => [
      { label: 'Alder', help: { id: 'qubitsEach', given: { qubits: 100, variables: 40 } } as HelpRequest },
      { label: 'Juniper', help: { id: 'qubitsEach', given: { qubits: 300, variables: 40 } } as HelpRequest },
    ]
    const wrapper = mount(UiComputed, {
      props: { label: 'each', cases, casesOf: 'machine' },
      attachTo: document.body,
    })
    let reached = false
    document.body.addEventListener('click', () => (reached = true), { once: true })
    await wrapper.get('button').trigger('click')
    expect(reached).toBe(false)
    const dialog = await opened()
    expect(dialog.querySelector('label')!.textContent).toContain('For machine')
    expect(dialog.textContent).toContain('= 2.5')
    const select = dialog.querySelector('select')!
    select.value = '1'
    select.dispatchEvent(new Event('change'))
    await flushPromises()
    expect(dialog.textContent).toContain('= 7.5')
    wrapper.unmount()
  })
})

describe('UiExplanation', () => {
  it('says the formula in words, hides the set one from screen readers, and keeps units apart', () => {
    const wrapper = mount(UiExplanation, { props: { explanation: explain(noise) } })
    expect(wrapper.get('math').attributes('aria-hidden')).toBe('true')
    expect(wrapper.get('.step .sr-only').text()).toContain('the square root of')
    expect(wrapper.get('.step .value').text()).toBe('Value: = 10 in units of the problem')
    expect(wrapper.text()).toContain('King & McGeoch')
    expect(wrapper.text()).toContain('Machine figures are what the steward entered')
  })
})

describe('UiFacts', () => {
  it('makes the label of a computed number a button, and leaves the others as they are', () => {
    const wrapper = mount(UiFacts, {
      props: {
        items: [
          { label: 'Variables', value: '40' },
          { label: 'Density', value: '22.4 %', help: density },
        ],
      },
    })
    expect(wrapper.findAll('dt').map((term) => term.text())).toEqual(['Variables', 'Density'])
    expect(wrapper.findAll('dt button')).toHaveLength(1)
  })
})
