// @vitest-environment happy-dom
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { focusFirstWrong, watchSubmitted } from '../../../../utils/ui/firstWrong'

const frames = async (count = 3) => {
  for (let i = 0; i < count; i++) await new Promise((resolve) => requestAnimationFrame(resolve))
}
const find = <T extends HTMLElement>(selector: string) => document.querySelector<T>(selector)!

beforeEach(() => {
  document.body.innerHTML = `
    <form>
      <input id="name" />
      <details><summary>More</summary><input id="seed" /></details>
      <input id="reads" />
      <button id="save">Save</button>
    </form>
    <input id="outside" />`
  find('#save').focus()
})
afterEach(() => (document.body.innerHTML = ''))

describe('focusFirstWrong', () => {
  it('takes the first in order, and unfolds what hides it', () => {
    find('#reads').setAttribute('aria-invalid', 'true')
    find('#seed').setAttribute('aria-invalid', 'true')
    expect(focusFirstWrong(find('form'))).toBe(true)
    expect(document.activeElement).toBe(find('#seed'))
    expect(find<HTMLDetailsElement>('details').open).toBe(true)
  })

  it('leaves the focus alone where nothing is wrong', () => {
    find('#name').setAttribute('aria-invalid', 'false')
    expect(focusFirstWrong(find('form'))).toBe(false)
    expect(document.activeElement).toBe(find('#save'))
  })
})

describe('watchSubmitted', () => {
  it('finds what the page itself marks at once, also when it was marked before', async () => {
    find('#reads').setAttribute('aria-invalid', 'true')
    watchSubmitted(find('form'))
    await frames()
    expect(document.activeElement).toBe(find('#reads'))
  })

  it('waits for the answer of the server', async () => {
    watchSubmitted(find('form'))
    await frames()
    expect(document.activeElement).toBe(find('#save'))
    find('#name').setAttribute('aria-invalid', 'true')
    await frames()
    expect(document.activeElement).toBe(find('#name'))
  })

  it('does not pull back a person who went on', async () => {
    watchSubmitted(find('form'))
    await frames()
    find('#outside').focus()
    find('#name').setAttribute('aria-invalid', 'true')
    await frames()
    expect(document.activeElement).toBe(find('#outside'))
  })

  it('does not interrupt typing in the field that had the focus', async () => {
    find('#reads').focus()
    watchSubmitted(find('form'))
    await frames()
    find('#reads').dispatchEvent(new Event('input', { bubbles: true }))
    find('#name').setAttribute('aria-invalid', 'true')
    await frames()
    expect(document.activeElement).toBe(find('#reads'))
  })
})
