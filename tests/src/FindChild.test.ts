import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it } from 'vitest'
import FindChild from '../../src/components/shell/FindChild.vue'
import { findKeyOn, useFindKey } from '../../src/composables/useFindKey.ts'
import { inPage } from '../support/mounted.ts'

const found = [
  {
    id: 'c1',
    recordNumber: 'FF-2026-0041',
    name: 'Robin Hale',
    birthDate: '2018-04-01',
    school: 'Mill Lane',
  },
  { id: 'c2', recordNumber: 'FF-2025-0007', name: 'Robin Hale', birthDate: '2016-11-21', school: null },
]

afterEach(() => {
  document.body.innerHTML = ''
  findKeyOn.value = true
})

const openBox = (rows: typeof found | null) =>
  mount(FindChild, {
    props: { open: true, words: 'hale', found: rows, busy: false, problem: null },
    global: { plugins: [PrimeVue] },
    attachTo: document.body,
  })

describe('FindChild', () => {
  it('tells namesakes apart by record number and birth date', () => {
    const options = openBox(found).findAll('[role="option"]')
    expect(options.map((option) => option.text())).toEqual([
      expect.stringContaining('FF-2026-0041 · born 1 Apr 2018 · Mill Lane'),
      expect.stringContaining('FF-2025-0007 · born 21 Nov 2016'),
    ])
  })

  it('walks with the arrow keys, round the ends, and chooses with Enter', async () => {
    const box = openBox(found)
    const input = box.get('input')
    const active = () => box.get(`#${input.attributes('aria-activedescendant')}`).attributes('aria-selected')
    expect(input.attributes('aria-activedescendant')).toBe('found-child-0')
    await input.trigger('keydown', { key: 'ArrowUp' })
    expect(input.attributes('aria-activedescendant')).toBe('found-child-1')
    expect(active()).toBe('true')
    await input.trigger('keydown', { key: 'Enter' })
    expect(box.emitted('choose')).toEqual([['c2']])
  })

  it('says how many were found, and what to try when nobody was', () => {
    expect(openBox(found).get('[role="status"]').text()).toBe('2 children found')
    expect(openBox([]).get('[role="status"]').text()).toMatch(/No child found.*record number/)
  })

  it('chooses nobody with Enter before anything was found', async () => {
    const box = openBox(null)
    await box.get('input').trigger('keydown', { key: 'Enter' })
    expect(box.emitted('choose')).toBeUndefined()
  })
})

describe('useFindKey', () => {
  const press = (key: string, target: EventTarget = document.body, more = {}) =>
    target.dispatchEvent(new KeyboardEvent('keydown', { key, bubbles: true, cancelable: true, ...more }))

  const counted = async () => {
    let opened = 0
    await inPage(() => useFindKey(() => (opened += 1)))
    return () => opened
  }

  it.each(['/', '`'])('opens with %s, so that either hand has a key', async (key) => {
    const opened = await counted()
    press(key)
    expect(opened()).toBe(1)
  })

  it('leaves the key to whoever types in a field, and to the browser’s own combinations', async () => {
    const opened = await counted()
    const field = document.createElement('textarea')
    document.body.append(field)
    press('/', field)
    press('/', document.body, { ctrlKey: true })
    expect(opened()).toBe(0)
  })

  it('does nothing once it is switched off on this device', async () => {
    const opened = await counted()
    findKeyOn.value = false
    press('/')
    expect(opened()).toBe(0)
  })
})
