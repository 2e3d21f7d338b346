// @vitest-environment happy-dom
import { mount } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { defineComponent, h, ref } from 'vue'
import UiCombobox from '../../../components/ui/Combobox.vue'
import UiField from '../../../components/ui/Field.vue'

const PORTS = ['Arran', 'Barra', 'Coll'].map((label) => ({ key: label.toLowerCase(), label, note: `port ${label[0]}` }))

/** A combobox whose owner answers with all ports that hold the words. */
function make(props: Record<string, unknown> = {}) {
  const words = ref('')
  const taken: string[] = []
  const owner = defineComponent(() => () => {
    return h(UiCombobox, {
      label: 'Port',
      none: 'No such port.',
      options: PORTS.filter(({ label }) => label.toLowerCase().includes(words.value)),
      words: words.value,
      'onUpdate:words': (next: string) => (words.value = next),
      onChoose: (key: string) => taken.push(key),
      ...props,
    })
  })
  const box = mount(owner)
  const input = box.get('input')
  const highlighted = () => box.findAll('[role=option]').find((one) => one.attributes('aria-selected') === 'true')
  return { box, input, words, taken, highlighted }
}

describe('UiCombobox', () => {
  it('is closed until something is typed, and ties list and option to the field', async () => {
    const { box, input, highlighted } = make()
    expect(input.attributes('aria-expanded')).toBe('false')
    expect(input.attributes('aria-controls')).toBeUndefined()
    await input.setValue('a')
    expect(input.attributes('aria-expanded')).toBe('true')
    expect(box.get('[role=listbox]').attributes('id')).toBe(input.attributes('aria-controls'))
    expect(highlighted()!.attributes('id')).toBe(input.attributes('aria-activedescendant'))
    expect(highlighted()!.text()).toContain('Arran')
  })

  it('goes round by the arrow keys and takes the one in turn with Enter', async () => {
    const { box, input, words, taken, highlighted } = make()
    await input.setValue('a')
    await input.trigger('keydown', { key: 'ArrowDown' })
    expect(highlighted()!.text()).toContain('Barra')
    await input.trigger('keydown', { key: 'ArrowDown' })
    expect(highlighted()!.text()).toContain('Arran')
    await input.trigger('keydown', { key: 'ArrowUp' })
    await input.trigger('keydown', { key: 'Enter' })
    expect(taken).toEqual(['barra'])
    expect(words.value).toBe('')
    expect(box.find('[role=listbox]').exists()).toBe(false)
  })

  it('leaves Enter to the form when there is nothing to choose', async () => {
    const { input } = make()
    const event = new KeyboardEvent('keydown', { key: 'Enter', cancelable: true })
    input.element.dispatchEvent(event)
    expect(event.defaultPrevented).toBe(false)
  })

  it('closes with Escape and keeps the words; says when there is no answer', async () => {
    const { box, input, words } = make()
    await input.setValue('x')
    expect(box.get('[role=status]').text()).toBe('No such port.')
    await input.trigger('keydown', { key: 'Escape' })
    expect(box.find('[role=status]').exists()).toBe(false)
    expect(words.value).toBe('x')
  })

  it('shows the choice that stands again once it is left', async () => {
    const { input } = make({ chosen: { key: 'coll', label: 'Coll' } })
    expect(input.element.value).toBe('Coll')
    await input.setValue('b')
    expect(input.element.value).toBe('b')
    await input.trigger('blur')
    expect(input.element.value).toBe('Coll')
  })

  it('in a form keeps what was chosen as its words', async () => {
    const { box, input, words, taken } = make({ keepsWords: true })
    await input.setValue('b')
    await box.get('[role=option]').trigger('click')
    expect([words.value, taken]).toEqual(['Barra', ['barra']])
    await input.trigger('blur')
    expect(input.element.value).toBe('Barra')
  })

  it('within a field takes its label, its error and its id', () => {
    const field = mount(UiField, {
      props: { label: 'Variable', error: 'No such variable.' },
      slots: { default: () => h(UiCombobox, { label: 'Variable', options: [], none: '', words: '' }) },
    })
    const input = field.get('input')
    expect(field.findAll('label')).toHaveLength(1)
    expect(field.get('label').attributes('for')).toBe(input.attributes('id'))
    expect(input.attributes('aria-invalid')).toBe('true')
    expect(field.get(`[id="${input.attributes('aria-describedby')}"]`).text()).toBe('No such variable.')
  })
})
