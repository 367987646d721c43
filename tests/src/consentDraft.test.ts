import { describe, expect, it } from 'vitest'
import { consentLines, positionOf, startConsent } from '@/components/referrals/consentDraft.ts'

// One consent record for each purpose, none implies another; e-mail belongs to one carer (clinic rule).
const mother = { email: 'mother@example.org', parentalResponsibility: 'yes' as const }
const father = { email: null, parentalResponsibility: 'yes' as const }
const grandmother = { email: 'gran@example.org', parentalResponsibility: 'no' as const }

const line = (purpose: string, carers: Parameters<typeof consentLines>[0], carer: string | null = null) =>
  consentLines(carers).find((candidate) => candidate.purpose === purpose && candidate.carer === carer)!

describe('consent lines of a referral', () => {
  it('offers e-mail once for each carer who has an address, and every other purpose once', () => {
    const lines = consentLines([mother, father, grandmother])
    expect(lines.filter(({ purpose }) => purpose === 'email_link').map(({ carer }) => carer)).toEqual([
      '0',
      '2',
    ])
    expect(lines.filter(({ purpose }) => purpose === 'assessment_treatment')).toHaveLength(1)
  })

  it('starts with the one carer who holds parental responsibility, on that basis', () => {
    const carers = [grandmother, mother]
    expect(startConsent(line('assessment_treatment', carers), carers, null)).toEqual({
      purpose: 'assessment_treatment',
      carer: '1',
      basis: 'parental_responsibility',
      method: null,
      expiresOn: null,
    })
  })

  it('chooses nobody and no basis when two hold it, or nobody does', () => {
    for (const carers of [[mother, father], [grandmother]]) {
      const started = startConsent(line('video', carers), carers, null)
      expect([started.carer, started.basis]).toEqual([null, null])
    }
  })

  it('claims no parental responsibility for an e-mail line of a carer who does not hold it', () => {
    const carers = [mother, grandmother]
    const started = startConsent(line('email_link', carers, '1'), carers, 'paper')
    expect(started).toMatchObject({ carer: '1', basis: null, method: 'paper' })
  })

  it('tells the e-mail lines of two carers apart', () => {
    const carers = [mother, grandmother]
    const given = [startConsent(line('email_link', carers, '1'), carers, 'paper')]
    expect(positionOf(given, line('email_link', carers, '0'))).toBe(-1)
    expect(positionOf(given, line('email_link', carers, '1'))).toBe(0)
  })
})
