import { flushPromises, mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach } from 'vitest'
import { createMemoryHistory, createRouter } from 'vue-router'
import { http } from '../../src/api/http.ts'
import MeasureDraftPage from '../../src/components/measures/MeasureDraftPage.vue'
import { emptyDetails, methodVersions, scoreMeasure } from '../../shared/measureScores.ts'
import type { MeasureDraft, MeasureOptions } from '../../shared/measureSchemas.ts'
import type { MeasureDetails, MeasureKind, MeasureView } from '../../shared/measures.ts'
import { refusal, type SentRequest } from './wire.ts'

const seed = 20260303

/** A draft as the server gives it, with nothing recorded unless details are given. */
export function measureDraft(
  kind: MeasureKind,
  options: Partial<MeasureOptions> = {},
  details: MeasureDetails = emptyDetails(kind, options, seed),
): MeasureView {
  return {
    id: 'measure',
    childId: 'child',
    kind,
    methodVersion: methodVersions[kind],
    measuredOn: '2026-03-03',
    details,
    score: scoreMeasure(details),
    notDoneReason: null,
    comment: null,
    startedBy: 'Ada Test',
    lockedAt: null,
    lockedBy: null,
    replacesId: null,
    replacedById: null,
    version: 1,
    can: { change: true, lock: true, replace: false },
  }
}

/** A server that keeps one measure and refuses a save from another version than its own. */
export function measureServer(start: MeasureView) {
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

const mounted: { unmount: () => void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
  document.body.innerHTML = ''
})

/** The page of a measure under way, in a small app; what it saves goes over the (fake) wire. */
export async function openMeasure(measure: MeasureView) {
  const here = { render: () => null }
  const router = createRouter({ history: createMemoryHistory(), routes: [{ path: '/', component: here }] })
  await router.push('/')
  const wrapper = mount(MeasureDraftPage, {
    attachTo: document.body,
    global: { plugins: [router, createPinia(), PrimeVue] },
    props: {
      measure,
      today: '2026-03-03',
      problem: null,
      save: (draft: MeasureDraft, version: number) =>
        http.put<MeasureView>('/measures/measure', draft, { ifMatch: version }),
      lock: (version: number) => http.post<MeasureView>('/measures/measure/lock', {}, { ifMatch: version }),
    },
  })
  mounted.push(wrapper)
  await flushPromises()

  const button = (label: string) => {
    const found = wrapper.findAll('button').find((one) => one.text().startsWith(label))
    if (!found) throw new Error(`No button ${label}`)
    return found
  }
  /** Presses a key where the focus is, or on the given element; tells whether the page took it. */
  const key = async (pressed: string, more: KeyboardEventInit = {}, on: Element = document.body) => {
    const event = new KeyboardEvent('keydown', { key: pressed, bubbles: true, cancelable: true, ...more })
    on.dispatchEvent(event)
    on.dispatchEvent(new KeyboardEvent('keyup', { key: pressed, bubbles: true, cancelable: true }))
    await flushPromises()
    return event.defaultPrevented
  }
  const keys = async (...pressed: string[]) => {
    for (const one of pressed) await key(one)
  }
  return { wrapper, button, key, keys, saveState: () => wrapper.get('.save').text() }
}
