import { flushPromises } from '@vue/test-utils'
import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { reactive, ref } from 'vue'
import { http } from '../../src/api/http.ts'
import { useAutosave } from '../../src/composables/useAutosave.ts'
import { answerStep, askedStep } from '../../src/composables/useConfirmStep.ts'
import { inPage } from '../support/mounted.ts'
import { fakeWire, refusal, type SentRequest } from '../support/wire.ts'

interface Note {
  text: string
}
interface Saved extends Note {
  version: number
}

beforeEach(() => {
  vi.useFakeTimers()
})
afterEach(() => {
  vi.useRealTimers()
})

/** A server with one note: refuses a save from another version than its own. */
function noteServer(start: Saved) {
  const stored = { ...start }
  return {
    stored,
    reply: (request: SentRequest) => {
      if (request.headers.get('If-Match') !== `"${stored.version}"`)
        return refusal(409, 'stale', { current: { ...stored } })
      Object.assign(stored, request.body, { version: stored.version + 1 })
      return { status: 200, body: { ...stored } }
    },
  }
}

async function openNote(delay?: number) {
  const note = reactive<Note>({ text: 'First' })
  const version = ref<number>(1)
  const page = await inPage(() =>
    useAutosave({
      value: () => note,
      version,
      delay,
      save: (value, from) => http.put<Saved>('/notes/1', value, { ifMatch: from }),
    }),
  )
  return { note, version, saving: page.result, ...page }
}

const pass = async (ms: number) => {
  await vi.advanceTimersByTimeAsync(ms)
  await flushPromises()
}

describe('useAutosave', () => {
  it('saves three seconds after the last key, once, with the version it has', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    const { sent } = fakeWire(reply)
    const { note, saving } = await openNote()
    note.text = 'First line'
    await pass(2_900)
    note.text = 'First line of the note'
    await pass(2_900)
    expect(sent).toHaveLength(0)
    await pass(200)
    expect(stored).toEqual({ text: 'First line of the note', version: 2 })
    expect(saving.state.value).toBe('saved')
    expect(saving.savedAt.value).toBeInstanceOf(Date)
    await pass(60_000)
    expect(sent).toHaveLength(1)
  })

  it('saves somebody who never pauses at least every fifteen seconds', async () => {
    const { reply } = noteServer({ text: 'First', version: 1 })
    const { sent } = fakeWire(reply)
    const { note } = await openNote()
    for (let second = 0; second < 16; second += 1) {
      note.text += '.'
      await pass(1_000)
    }
    expect(sent).toHaveLength(1)
  })

  it('counts versions on, so that its own saves never conflict', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    fakeWire(reply)
    const { note, saving } = await openNote()
    note.text = 'a'
    await saving.flush()
    note.text = 'b'
    await saving.flush()
    expect(stored).toEqual({ text: 'b', version: 3 })
  })

  it('saves what was typed while a save was on its way, in order', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    let letGo = () => {}
    const held = new Promise<void>((resolve) => {
      letGo = resolve
    })
    const { sent } = fakeWire(async (request) => {
      await held
      return reply(request)
    }, reply)
    const { note, saving } = await openNote()
    note.text = 'one'
    await pass(3_000)
    note.text = 'two'
    await pass(3_000)
    expect(sent).toHaveLength(1)
    letGo()
    await saving.flush()
    expect(stored).toEqual({ text: 'two', version: 3 })
    expect(sent.map(({ body }) => (body as Note).text)).toEqual(['one', 'two'])
  })

  it('tries again by itself when the network was gone, and keeps the text meanwhile', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    fakeWire('cut', reply)
    const { note, saving } = await openNote()
    note.text = 'kept'
    await pass(3_000)
    expect(saving.state.value).toBe('failed')
    expect(saving.pending.value).toBe(true)
    await pass(5_000)
    expect(saving.state.value).toBe('saved')
    expect(stored.text).toBe('kept')
  })

  it('saves at once when the browser says the network is back', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    fakeWire('cut', reply)
    const { note } = await openNote()
    note.text = 'kept'
    await pass(3_000)
    window.dispatchEvent(new Event('online'))
    await pass(0)
    expect(stored.text).toBe('kept')
  })

  it('waits as long as a busy server asks', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    fakeWire({ ...refusal(503, 'unavailable'), headers: { 'Retry-After': '20' } }, reply)
    const { note } = await openNote()
    note.text = 'kept'
    await pass(3_000)
    await pass(19_000)
    expect(stored.text).toBe('First')
    await pass(1_500)
    expect(stored.text).toBe('kept')
  })

  it('does not repeat a refused text, but tries the mended one', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    const { sent } = fakeWire(refusal(422, 'invalid', { fields: { text: 'Too long' } }), reply)
    const { note, saving } = await openNote()
    note.text = 'too long'
    await pass(3_000)
    await pass(120_000)
    expect(sent).toHaveLength(1)
    expect(saving.state.value).toBe('failed')
    note.text = 'short'
    await pass(3_000)
    expect(stored.text).toBe('short')
  })

  it('stops on a conflict with both texts in hand; keeping mine saves it over the other', async () => {
    const { stored, reply } = noteServer({ text: 'Theirs', version: 5 })
    const { sent } = fakeWire(reply)
    const { note, saving } = await openNote()
    note.text = 'Mine'
    await pass(3_000)
    expect(saving.state.value).toBe('conflict')
    expect(saving.conflict.value).toEqual({
      mine: { text: 'Mine' },
      theirs: { text: 'Theirs', version: 5 },
    })
    note.text = 'Mine, longer'
    await pass(60_000)
    expect(sent).toHaveLength(1)
    await saving.resolve('mine')
    expect(stored).toEqual({ text: 'Mine, longer', version: 6 })
    expect(saving.conflict.value).toBeNull()
  })

  it('hands the other text back when it is taken, and counts it as saved', async () => {
    const { stored, reply } = noteServer({ text: 'Theirs', version: 5 })
    const { sent } = fakeWire(reply)
    const { note, version, saving } = await openNote()
    note.text = 'Mine'
    await pass(3_000)
    const theirs = await saving.resolve('theirs')
    expect(theirs).toEqual({ text: 'Theirs', version: 5 })
    note.text = theirs?.text ?? ''
    version.value = theirs?.version ?? 0
    await saving.rebase()
    await pass(60_000)
    expect(sent).toHaveLength(1)
    note.text = 'Theirs and mine'
    await pass(3_000)
    expect(stored).toEqual({ text: 'Theirs and mine', version: 6 })
  })

  it('saves before the page is left, and asks only when that fails', async () => {
    const { stored, reply } = noteServer({ text: 'First', version: 1 })
    fakeWire('cut', reply)
    const { note, router } = await openNote()
    note.text = 'on the way out'
    const leaving = router.push('/elsewhere')
    await pass(0)
    expect(askedStep.value?.title).toBe('Leave without saving?')
    answerStep(false)
    await leaving
    expect(router.currentRoute.value.path).toBe('/here')
    await router.push('/elsewhere')
    expect(stored.text).toBe('on the way out')
    expect(router.currentRoute.value.path).toBe('/elsewhere')
  })

  it('writes nothing to web storage', async () => {
    const { reply } = noteServer({ text: 'First', version: 1 })
    fakeWire(reply)
    const { note, saving } = await openNote()
    note.text = 'confidential'
    await saving.flush()
    expect(localStorage.length + sessionStorage.length).toBe(0)
  })
})
