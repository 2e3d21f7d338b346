// @vitest-environment happy-dom
import { mount, RouterLinkStub } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { h, nextTick } from 'vue'
import UiButton from '../../../components/ui/Button.vue'
import UiFacts from '../../../components/ui/Facts.vue'
import UiField from '../../../components/ui/Field.vue'
import UiFileDrop from '../../../components/ui/FileDrop.vue'
import UiInput from '../../../components/ui/Input.vue'
import UiMark from '../../../components/ui/Mark.vue'
import UiNotice from '../../../components/ui/Notice.vue'
import UiProgress from '../../../components/ui/Progress.vue'
import UiRadioRow from '../../../components/ui/RadioRow.vue'
import UiSortHead from '../../../components/ui/SortHead.vue'
import UiTabs from '../../../components/ui/Tabs.vue'
import UiTable from '../../../components/ui/Table.vue'
import UiWire from '../../../components/ui/Wire.vue'

const global = { components: { NuxtLink: RouterLinkStub } }

describe('UiField with UiInput', () => {
  const make = (props: Record<string, unknown> = {}) =>
    mount(UiField, {
      props: { label: 'Quench slope', hint: 'per µs', ...props },
      slots: { default: () => h(UiInput, { numeric: true, modelValue: 1.6 }) },
    })

  it('ties label, hint and error to the control', () => {
    const field = make({ error: 'Too steep.' })
    const input = field.get('input')
    expect(field.get('label').attributes('for')).toBe(input.attributes('id'))
    const described = input.attributes('aria-describedby')?.split(' ') ?? []
    expect(described.map((id) => field.get(`[id="${id}"]`).text())).toEqual(['per µs', 'Too steep.'])
    expect(input.attributes('aria-invalid')).toBe('true')
  })

  it('says what cannot be read as a number and keeps what was typed', async () => {
    const field = make()
    expect(field.get('input').attributes('aria-invalid')).toBeUndefined()
    await field.get('input').setValue('1,5')
    expect(field.get('[role=alert]').text()).toContain('“1,5” is not a number')
    expect(field.get('input').element.value).toBe('1,5')
    await field.get('input').setValue('1.5')
    expect(field.find('[role=alert]').exists()).toBe(false)
  })

  it('gives numbers, null for nothing, NaN for what is no number', async () => {
    const input = mount(UiInput, { props: { numeric: true, modelValue: -0.5 } })
    expect(input.get('input').element.value).toBe('\u22120.5')
    for (const text of ['1 000', '', 'x']) await input.get('input').setValue(text)
    expect(input.emitted('update:modelValue')).toEqual([[1000], [null], [Number.NaN]])
  })
})

describe('UiButton', () => {
  it('keeps quiet and says why when it is unavailable', async () => {
    const button = mount(UiButton, {
      props: { unavailable: 'not approved yet', to: '/x' },
      slots: { default: 'Issue' },
      global,
    })
    const inner = button.get('button')
    expect(inner.attributes('aria-disabled')).toBe('true')
    expect(button.get(`[id="${inner.attributes('aria-describedby')}"]`).text()).toBe('not approved yet')
    await inner.trigger('click')
    expect(button.emitted('click')).toBeUndefined()
  })

  it('is a link to a page and emits its clicks', async () => {
    const button = mount(UiButton, { props: { to: '/machines' }, slots: { default: 'Machines' }, global })
    expect(button.getComponent(RouterLinkStub).props('to')).toBe('/machines')
    const plain = mount(UiButton, { slots: { default: 'Go' }, global })
    await plain.get('button').trigger('click')
    expect(plain.emitted('click')).toHaveLength(1)
  })
})

describe('UiWire', () => {
  const wire = mount(UiWire, {
    props: {
      current: 'Strength',
      stages: [
        { label: 'Problem', note: '40 variables', state: 'done', to: '/problems/2' },
        { label: 'Strength', state: 'under way' },
        { label: 'Answer', note: 'not yet', state: 'not yet' },
      ],
    },
    global,
  })

  it('marks the current stage and says every state once', () => {
    expect(wire.findAll('[aria-current=step]').map((stage) => stage.text())).toEqual(['Strength, under way'])
    expect(wire.findAll('li').map((stage) => stage.text().replace(/\s+/g, ' '))).toEqual([
      'Problem, done40 variables',
      'Strength, under way',
      'Answernot yet',
    ])
    expect(wire.findAllComponents(RouterLinkStub)).toHaveLength(1)
  })
})

describe('tables', () => {
  it('sorts by a heading: first direction, then the other', async () => {
    const head = mount(UiSortHead, { props: { label: 'Break %', field: 'breaks', numeric: true } })
    await head.get('button').trigger('click')
    const sort = { field: 'breaks', direction: 'descending' as const }
    expect(head.emitted('sort')?.[0]).toEqual([sort])
    await head.setProps({ sort })
    expect(head.attributes('aria-sort')).toBe('descending')
    await head.get('button').trigger('click')
    expect(head.emitted('sort')?.[1]).toEqual([{ field: 'breaks', direction: 'ascending' }])
  })

  it('gives the cells of a stacking table their headings and roles', async () => {
    const table = mount(UiTable, {
      props: { caption: 'Chains', stack: true },
      slots: {
        head: '<tr><th scope="col">Variable</th><th scope="col">Qubits</th></tr>',
        default: '<tr><th scope="row">dun.2</th><td>4</td></tr>',
      },
    })
    await nextTick()
    await nextTick()
    expect(table.get('td').attributes()).toMatchObject({ 'data-label': 'Qubits', role: 'cell' })
    expect(table.get('tbody th').attributes('role')).toBe('rowheader')
    expect(table.get('caption').text()).toBe('Chains')
  })

  it('chooses a row by its radio or by a click anywhere on it, unless it cannot be chosen', async () => {
    const row = mount(UiRadioRow, {
      props: { name: 'rule', value: 'rms', label: 'Root-mean-square', modelValue: 'fixed' },
    })
    await row.trigger('click')
    expect(row.emitted('update:modelValue')).toEqual([['rms']])
    const off = mount(UiRadioRow, {
      props: {
        name: 'rule',
        value: 'rms',
        label: 'Root-mean-square',
        modelValue: 'fixed',
        unavailable: 'needs an embedding',
      },
    })
    await off.trigger('click')
    expect(off.emitted('update:modelValue')).toBeUndefined()
    expect(off.get('input').attributes('disabled')).toBeDefined()
  })
})

describe('UiNotice', () => {
  it('is an alert for errors only and folds long lists away', () => {
    const issues = Array.from({ length: 5 }, (_, line) => ({ line: line + 1, message: 'bad' }))
    const notice = mount(UiNotice, { props: { title: 'Five lines.', issues, limit: 3 } })
    expect(notice.attributes('role')).toBe('alert')
    expect(notice.get('summary').text()).toBe('2 more')
    expect(notice.findAll('.place').map((place) => place.text())).toEqual([
      'line 1',
      'line 2',
      'line 3',
      'line 4',
      'line 5',
    ])
    expect(mount(UiNotice, { props: { title: 'Note.', kind: 'info' } }).attributes('role')).not.toBe('alert')
  })
})

describe('UiFileDrop', () => {
  const file = (name: string, size: number) => new File(['x'.repeat(size)], name)

  it('takes a file of a known ending and refuses others with the reason', async () => {
    const drop = mount(UiFileDrop, { props: { label: 'File', endings: ['.csv'], maxBytes: 100 }, global })
    await drop.get('.drop').trigger('drop', { dataTransfer: { files: [file('A.CSV', 50)] } })
    expect(drop.emitted('file')?.[0]).toEqual([expect.objectContaining({ name: 'A.CSV' })])
    await drop.get('.drop').trigger('drop', { dataTransfer: { files: [file('a.exe', 50)] } })
    expect(drop.get('[role=alert]').text()).toBe('a.exe does not end in .csv.')
    expect(drop.emitted('file')?.[1]).toEqual([null])
    await drop.get('.drop').trigger('drop', { dataTransfer: { files: [file('b.csv', 101)] } })
    expect(drop.get('[role=alert]').text()).toContain('at most 100')
  })
})

describe('UiProgress', () => {
  it('tells its value to assistive technology and emits stop', async () => {
    const work = mount(UiProgress, {
      props: { title: 'Embedding on Alder', value: 0.24, elapsedSeconds: 2.4, limitSeconds: 10, message: 'try 2 of 8' },
      global,
    })
    const bar = work.get('[role=progressbar]')
    expect(bar.attributes('aria-valuenow')).toBe('24')
    expect(work.text()).toContain('2.4\u202fs of 10\u202fs')
    await work.get('button').trigger('click')
    expect(work.emitted('stop')).toHaveLength(1)
    await work.setProps({ value: null })
    expect(work.get('[role=progressbar]').attributes('aria-valuenow')).toBeUndefined()
  })
})

it('reads out a mark without a word, once', () => {
  expect(mount(UiMark, { props: { kind: 'caution' } }).text()).toBe('caution')
  expect(mount(UiMark, { props: { kind: 'caution', word: 'two embeddings' } }).text()).toBe('two embeddings')
  expect(mount(UiMark, { props: { kind: 'caution', silent: true } }).text()).toBe('')
})

it('lists facts as terms and values', () => {
  const facts = mount(UiFacts, {
    props: {
      items: [
        { label: 'Anneal', value: 72, unit: 'µs' },
        { label: 'State', value: 'draft', mark: 'draft' },
      ],
    },
  })
  expect(facts.findAll('dt').map((term) => term.text())).toEqual(['Anneal', 'State'])
  expect(facts.findAll('dd').map((value) => value.text())).toEqual(['72µs', 'draft'])
})

describe('UiTabs', () => {
  it('shows one panel, keeps what the others hold, and goes by arrow keys', async () => {
    const tabs = mount(UiTabs, {
      props: {
        label: 'How',
        tabs: [
          { key: 'search', label: 'Look' },
          { key: 'import', label: 'Import' },
        ],
        modelValue: 'search',
        'onUpdate:modelValue': (key: string) => tabs.setProps({ modelValue: key }),
      },
      slots: { search: () => h('input', { id: 'seed' }), import: () => h('p', 'chains') },
      attachTo: document.body,
    })
    await nextTick()
    await tabs.get('#seed').setValue('4')
    const [look, importing] = tabs.findAll('[role=tab]')
    expect(look!.attributes('aria-selected')).toBe('true')
    ;(look!.element as HTMLElement).focus()
    await look!.trigger('keydown', { key: 'ArrowRight' })
    await nextTick()
    expect(importing!.attributes('aria-selected')).toBe('true')
    expect(tabs.get('[role=tabpanel][data-state=active]').text()).toBe('chains')
    expect((tabs.get('#seed').element as HTMLInputElement).value).toBe('4')
    tabs.unmount()
  })
})

describe('UiTable, stacking', () => {
  it('labels each cell with the words of its heading, without the arrow of the sorted one', async () => {
    const sort = { field: 'reads', direction: 'descending' as const }
    const table = mount(UiTable, {
      props: { caption: 'Run sheets', stack: true },
      slots: {
        head: () => h('tr', [h('th', 'Name'), h(UiSortHead, { label: 'Reads', field: 'reads', sort, numeric: true })]),
        default: () => h('tr', [h('th', { scope: 'row' }, 'First'), h('td', '1000')]),
      },
    })
    await nextTick()
    await nextTick()
    expect(table.get('thead').text()).toContain('↓')
    expect(table.get('td').attributes('data-label')).toBe('Reads')
  })
})
