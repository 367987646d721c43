import { flushPromises } from '@vue/test-utils'
import { boolean } from 'yup'
import { describe, expect, it, vi } from 'vitest'
import { nextTick, watch } from 'vue'
import { http } from '../../src/api/http.ts'
import { answerStep, askedStep } from '../../src/composables/useConfirmStep.ts'
import { useForm } from '../../src/composables/useForm.ts'
import { nameTab } from '../../src/composables/usePageTitle.ts'
import { body, email, optionalText, text } from '../../shared/fields.ts'
import { inPage } from '../support/mounted.ts'
import { fakeWire, refusal } from '../support/wire.ts'

const schema = body({
  title: text('The title', { max: 20 }),
  note: optionalText('The note', { max: 50 }),
  email: email(),
  urgent: boolean().required(),
})

const openForm = (initial = { title: '', note: '', email: '', urgent: false }, saved = () => {}) =>
  inPage(() => useForm({ schema, initial: () => initial, save: (sent) => http.post('/things', sent), saved }))

const filled = { title: ' Desk ', note: '', email: 'a@example.org', urgent: true }

describe('useForm', () => {
  it('sends nothing and says what is missing when a form is submitted empty', async () => {
    const { sent } = fakeWire({ status: 201 })
    const { result: form } = await openForm()
    expect(form.fieldErrors.value).toEqual({})
    await form.submit()
    expect(form.fieldErrors.value).toEqual({
      title: 'Enter the title',
      email: 'Enter e-mail address',
    })
    expect(sent).toEqual([])
  })

  it('sends the text as the server would tidy it, with absence as null', async () => {
    const { sent } = fakeWire({ status: 201, body: { id: 'x' } })
    const saved = vi.fn<() => void>()
    const { result: form } = await openForm(filled, saved)
    await form.submit()
    expect(sent[0]?.body).toEqual({ title: 'Desk', note: null, email: 'a@example.org', urgent: true })
    expect(saved).toHaveBeenCalledOnce()
  })

  it('begins the tab with "Error:" while a form is refused and stops when it is mended', async () => {
    fakeWire({ status: 201 })
    const { result: form } = await openForm({ ...filled, title: '' })
    nameTab('New thing')
    await form.submit()
    await nextTick()
    expect(document.title).toBe('Error: New thing · Fanflower')
    form.values.title = 'Chair'
    await vi.waitFor(() => expect(document.title).toBe('New thing · Fanflower'))
    expect(form.fieldErrors.value).toEqual({})
  })

  it('adds no message while somebody types, only takes away what is mended', async () => {
    fakeWire({ status: 201 })
    const { result: form } = await openForm({ ...filled, title: '' })
    await form.submit()
    form.values.email = 'not an address'
    form.values.title = 'Chair'
    await vi.waitFor(() => expect(form.fieldErrors.value).toEqual({}))
    await form.submit()
    expect(Object.keys(form.fieldErrors.value)).toEqual(['email'])
  })

  it('puts the server’s words beside the fields and keeps what was typed', async () => {
    fakeWire(refusal(422, 'invalid', { fields: { email: 'This address is known already' } }))
    const { result: form } = await openForm(filled)
    await form.submit()
    expect(form.fieldErrors.value).toEqual({ email: 'This address is known already' })
    expect(form.values.title).toBe(' Desk ')
  })

  it('keeps what is stored now when the save was stale', async () => {
    fakeWire(refusal(409, 'stale', { current: { version: 8, title: 'Stool' } }))
    const { result: form } = await openForm(filled)
    await form.submit()
    expect(form.conflict.value).toEqual({ version: 8, title: 'Stool' })
    expect(form.problem.value?.code).toBe('stale')
    expect(form.values.title).toBe(' Desk ')
  })

  it('sends once when the button is pressed twice', async () => {
    const { sent } = fakeWire({ status: 201 })
    const { result: form } = await openForm(filled)
    await Promise.all([form.submit(), form.submit()])
    expect(sent).toHaveLength(1)
  })

  it('says that nothing is saved when the network is gone, and saves on the next try', async () => {
    const { sent } = fakeWire('cut', { status: 201 })
    const { result: form } = await openForm(filled)
    await form.submit()
    expect(form.problem.value?.code).toBe('unreachable')
    await form.submit()
    expect(form.problem.value).toBeNull()
    expect(sent).toHaveLength(2)
  })

  it('asks before a changed form is left, and not after it is saved', async () => {
    fakeWire({ status: 201 })
    const { result: form, router } = await openForm(filled)
    expect(form.dirty.value).toBe(false)
    form.values.title = 'Table'
    expect(form.dirty.value).toBe(true)

    const leaving = router.push('/elsewhere')
    await flushPromises()
    expect(askedStep.value?.title).toBe('Leave without saving?')
    answerStep(false)
    await leaving
    expect(router.currentRoute.value.path).toBe('/here')

    await form.submit()
    await router.push('/elsewhere')
    expect(router.currentRoute.value.path).toBe('/elsewhere')
  })

  it('asks once for the whole page when two forms on it are changed', async () => {
    const options = {
      schema,
      initial: () => ({ ...filled }),
      save: (sent: object) => http.post('/things', sent),
    }
    const { result: forms, router } = await inPage(() => [useForm(options), useForm(options)] as const)
    forms[0].values.title = 'Table'
    forms[1].values.title = 'Chair'
    let asked = 0
    const stop = watch(askedStep, (step) => (asked += step ? 1 : 0), { flush: 'sync' })
    const leaving = router.push('/elsewhere')
    await flushPromises()
    answerStep(true)
    await leaving
    stop()
    expect(asked).toBe(1)
    expect(router.currentRoute.value.path).toBe('/elsewhere')
  })

  it('asks the browser to hold a tab with unsaved changes', async () => {
    const { result: form } = await openForm(filled)
    const closing = () => {
      const event = new Event('beforeunload', { cancelable: true })
      window.dispatchEvent(event)
      return event.defaultPrevented
    }
    expect(closing()).toBe(false)
    form.values.title = 'Table'
    expect(closing()).toBe(true)
    form.reset()
    expect(closing()).toBe(false)
  })

  it('does not touch the given values while somebody types, and goes back to them', async () => {
    const given = { ...filled }
    const { result: form } = await openForm(given)
    form.values.title = 'Table'
    expect(given.title).toBe(' Desk ')
    form.reset()
    expect(form.values.title).toBe(' Desk ')
    expect(form.dirty.value).toBe(false)
  })
})
