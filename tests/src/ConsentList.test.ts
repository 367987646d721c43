import { mount } from '@vue/test-utils'
import PrimeVue from 'primevue/config'
import { describe, expect, it } from 'vitest'
import ConsentList from '@/components/family/ConsentList.vue'
import type { ConsentPurpose } from '@shared/consents.ts'
import type { MyConsent } from '@shared/family.ts'

const consent = (purpose: ConsentPurpose, inForce: boolean, mayGive = !inForce): MyConsent => ({
  purpose,
  label: purpose,
  consequence: 'Nothing changes.',
  inForce,
  consentId: inForce ? purpose : null,
  givenBy: inForce ? 'Orla Finch' : null,
  givenAt: inForce ? '2026-11-02T10:00:00.000Z' : null,
  can: { give: mayGive, withdraw: inForce },
})
const list = (consents: MyConsent[]) =>
  mount(ConsentList, {
    props: { consents, timeZone: 'Europe/London', busy: null, problem: null },
    global: { plugins: [PrimeVue] },
  })
const fold = (wrapper: ReturnType<typeof list>) => {
  const details = wrapper.find('details')
  return { open: (details.element as HTMLDetailsElement).open, title: details.find('summary').text() }
}

// Rules of this product, no source.
describe('what a family has agreed to', () => {
  it('folds away what is not agreed and says how much that is', () => {
    const wrapper = list([
      consent('video', true),
      consent('teaching_use', false),
      consent('share_doctor', false),
    ])
    expect(fold(wrapper)).toEqual({ open: false, title: '2 more you may agree to' })
    expect(wrapper.find('details').text()).not.toContain('video')
  })

  it('does not promise a choice that is somebody else’s', () => {
    expect(fold(list([consent('video', false, false)])).title).toBe('1 not agreed')
  })

  it('shows a consent that was stopped just now', async () => {
    const wrapper = list([
      consent('video', true),
      consent('share_doctor', true),
      consent('teaching_use', false),
    ])
    await wrapper.setProps({
      consents: [consent('video', false), consent('share_doctor', true), consent('teaching_use', false)],
    })
    expect(fold(wrapper)).toEqual({ open: true, title: '2 more you may agree to' })
  })
})
