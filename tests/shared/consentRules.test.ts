import { describe, expect, it } from 'vitest'
import { consentProblem } from '../../shared/consentRules.ts'

const today = '2026-12-01'
const mother = {
  name: 'Rosalind Quayle',
  parentalResponsibility: 'yes',
  email: 'rosalind@quayle.example',
  safeToContact: true,
  restricted: false,
} as const
const asked = {
  purpose: 'assessment_treatment',
  basis: 'parental_responsibility',
  expiresOn: null,
} as const

// Who may consent: common practice in England (a person with parental responsibility, or a competent young person);
// other places differ, which is why the other bases exist.
describe('a consent', () => {
  it.each([
    ['from a carer with parental responsibility', asked, mother, null],
    [
      'where responsibility is not known',
      asked,
      { ...mother, parentalResponsibility: 'unknown' as const },
      'carer',
    ],
    ['from a carer without it', asked, { ...mother, parentalResponsibility: 'no' as const }, 'carer'],
    ['without any carer', asked, null, 'carer'],
    [
      'on a court order from a carer without it',
      { ...asked, basis: 'court_order' as const },
      { ...mother, parentalResponsibility: 'no' as const },
      null,
    ],
    [
      'from the young person, where no carer is named',
      { ...asked, basis: 'young_person_competent' as const },
      null,
      null,
    ],
    ['on another basis that is not said', { ...asked, basis: 'other' as const, note: null }, mother, 'note'],
    [
      'on another basis that is said',
      { ...asked, basis: 'other' as const, note: 'Local authority' },
      null,
      null,
    ],
    ['from a restricted carer', asked, { ...mother, restricted: true }, 'carer'],
    ['that ends today', { ...asked, expiresOn: today }, mother, 'expiresOn'],
    ['that ends tomorrow', { ...asked, expiresOn: '2026-12-02' }, mother, null],
    [
      'to e-mail without an address',
      { ...asked, purpose: 'email_link' as const },
      { ...mother, email: null },
      'carer',
    ],
    [
      'to e-mail where contact is not safe',
      { ...asked, purpose: 'email_attachment' as const },
      { ...mother, safeToContact: false },
      'carer',
    ],
    [
      'to e-mail from the young person, without a carer',
      { ...asked, purpose: 'email_link' as const, basis: 'young_person_competent' as const },
      null,
      'carer',
    ],
  ])('%s: problem in %4$s', (_what, given, carer, field) => {
    expect(consentProblem(given, carer, today)?.field ?? null).toBe(field)
  })
})
