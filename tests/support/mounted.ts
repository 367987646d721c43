import { mount } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach } from 'vitest'
import { h } from 'vue'
import { createMemoryHistory, createRouter } from 'vue-router'

const mounted: { unmount: () => void }[] = []
afterEach(() => {
  for (const wrapper of mounted.splice(0)) wrapper.unmount()
  document.body.innerHTML = ''
})

/** Runs a composable inside a page of a small app with router, pinia and PrimeVue, and gives what it returned. */
export async function inPage<T>(setup: () => T, address = '/here') {
  const kept: { result?: T } = {}
  const Page = {
    setup() {
      kept.result = setup()
      return () => h('p', 'page')
    },
  }
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [
      { path: '/here', component: Page },
      { path: '/elsewhere', component: { render: () => h('p', 'elsewhere') } },
    ],
  })
  await router.push(address)
  const wrapper = mount(Page, {
    attachTo: document.body,
    global: { plugins: [router, createPinia(), PrimeVue] },
  })
  mounted.push(wrapper)
  return { result: kept.result as T, router, wrapper }
}
