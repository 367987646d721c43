import { flushPromises, mount, type VueWrapper } from '@vue/test-utils'
import { createPinia } from 'pinia'
import PrimeVue from 'primevue/config'
import { afterEach, describe, expect, it, vi } from 'vitest'
import { h, type Component } from 'vue'
import { createMemoryHistory, createRouter } from 'vue-router'
import InvitationView from '../../src/views/auth/InvitationView.vue'
import ResetPasswordView from '../../src/views/auth/ResetPasswordView.vue'
import SignInView from '../../src/views/auth/SignInView.vue'
import { useSessionStore } from '../../src/stores/session.ts'
import { person, sessionOf } from '../support/sessions.ts'
import { fakeWire, refusal } from '../support/wire.ts'

const page = { render: () => h('p', 'page') }

async function open(view: Component, address: string) {
  const router = createRouter({
    history: createMemoryHistory(),
    routes: [
      { name: 'sign-in', path: '/sign-in', component: page },
      { name: 'forgot-password', path: '/forgot-password', component: page },
      { name: 'link', path: '/link', component: page },
      { path: '/:path(.*)*', component: page },
    ],
  })
  await router.push(address)
  const wrapper = mount(view, {
    global: { plugins: [createPinia(), PrimeVue, router] },
    attachTo: document.body,
  })
  return { wrapper, router }
}

/** A form has settled when its button no longer turns. */
const settled = async (wrapper: VueWrapper) => {
  await flushPromises()
  await vi.waitFor(() => expect(wrapper.find('.p-button-loading').exists()).toBe(false))
  await flushPromises()
}

afterEach(() => {
  document.body.innerHTML = ''
  window.history.replaceState(null, '', '/')
})

describe('signing in', () => {
  const fill = async (wrapper: Awaited<ReturnType<typeof open>>['wrapper']) => {
    await wrapper.get('input[autocomplete="username"]').setValue('ada@example.org')
    await wrapper.get('input[autocomplete="current-password"]').setValue('secret words of mine')
    await wrapper.get('form').trigger('submit')
    await settled(wrapper)
  }

  it.each([
    ['/children/c1/goals', '/children/c1/goals'],
    ['//evil.example/x', '/'],
    ['/\\evil.example', '/'],
    ['https://evil.example', '/'],
    ['javascript:alert(1)', '/'],
  ])('goes on to %s as %s', async (asked, reached) => {
    fakeWire({ status: 200, body: sessionOf(person('ada')) })
    const { wrapper, router } = await open(SignInView, `/sign-in?to=${encodeURIComponent(asked)}`)
    await fill(wrapper)
    expect(router.currentRoute.value.path).toBe(reached)
  })

  it('keeps the address and the password that were typed when they do not go together', async () => {
    fakeWire(refusal(401, 'sign_in_failed'))
    const { wrapper } = await open(SignInView, '/sign-in')
    await fill(wrapper)
    expect(wrapper.text()).toContain('Refused: sign_in_failed')
    expect(wrapper.get<HTMLInputElement>('input[autocomplete="username"]').element.value).toBe(
      'ada@example.org',
    )
    expect(useSessionStore().user).toBeNull()
  })

  it('lets a password be looked at and pasted', async () => {
    const { wrapper } = await open(SignInView, '/sign-in')
    const password = wrapper.get('input[autocomplete="current-password"]')
    expect(password.attributes('type')).toBe('password')
    await wrapper.get('button[aria-pressed]').trigger('click')
    expect(password.attributes('type')).toBe('text')
    const pasted = new Event('paste', { cancelable: true })
    password.element.dispatchEvent(pasted)
    expect(pasted.defaultPrevented).toBe(false)
  })
})

describe('links from an e-mail', () => {
  const token = 'a'.repeat(43)

  it.each([
    ['invitation', InvitationView, '/api/invitations/confirm'],
    ['reset', ResetPasswordView, '/api/password-resets/confirm'],
  ])('takes the secret of an %s out of the address bar at once and only posts it', async (_, view, path) => {
    const { sent } = fakeWire({ status: 204 })
    window.history.replaceState(null, '', `/link#${token}`)
    const { wrapper } = await open(view, '/link')
    expect(window.location.href).not.toContain(token)
    expect(sent).toEqual([])
    await wrapper.get('input[autocomplete="new-password"]').setValue('several words together')
    await wrapper.get('form').trigger('submit')
    await settled(wrapper)
    expect(sent.map(({ method, path: to, body }) => [method, to, body])).toEqual([
      ['POST', path, { token, newPassword: 'several words together' }],
    ])
    expect(wrapper.html()).not.toContain(token)
  })

  it('says what to do when a link was used already', async () => {
    fakeWire(refusal(410, 'link_used'))
    window.history.replaceState(null, '', `/link#${token}`)
    const { wrapper } = await open(ResetPasswordView, '/link')
    await wrapper.get('input[autocomplete="new-password"]').setValue('several words together')
    await wrapper.get('form').trigger('submit')
    await settled(wrapper)
    expect(wrapper.get('[role="alert"]').text()).toMatch(/used or is too old/)
    expect(wrapper.text()).toContain('Send me a new link')
  })

  it('asks for a longer password before anything is sent', async () => {
    const { sent } = fakeWire({ status: 204 })
    window.history.replaceState(null, '', `/link#${token}`)
    const { wrapper } = await open(InvitationView, '/link')
    await wrapper.get('input[autocomplete="new-password"]').setValue('too short')
    await wrapper.get('form').trigger('submit')
    await settled(wrapper)
    expect(wrapper.text()).toContain('Use at least 15 characters')
    expect(sent).toEqual([])
  })
})
