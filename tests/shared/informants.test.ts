import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compareInformants } from '../../shared/informants.ts'
import { answered, formNamed } from '../support/handEvidence.ts'

describe('compareInformants', () => {
  it('sets the newest locked answers of each informant of one form side by side', () => {
    const [found] = compareInformants([
      answered('R', { answeredOn: '2025-01-01' }),
      answered('L L L L L L R R B N'),
      answered('LL L L L L L L L B L', { informant: 'teacher' }),
    ])
    expect(found?.columns.map(({ label, answeredOn }) => [label, answeredOn])).toEqual([
      ['Parent or carer', '2026-03-03'],
      ['Teacher', '2026-03-03'],
    ])
    expect(found?.items.filter(({ differs }) => differs).map(({ label }) => label)).toEqual([
      'Unscrews a lid: which hand turns',
      'Picks up something small',
    ])
    // Nine compared, seven agree: the tenth is "does not do this yet" at home. Kappa by hand: observed 7/9; rows
    // left 6, right 2, either 1; columns left 8, either 1; by chance (6·8 + 1·1)/81 = 49/81; (63 − 49)/(81 − 49).
    expect(found?.pairs[0]).toMatchObject({ compared: 9, agreed: 7, discrepancies: 2, pointedOut: false })
    expect(found?.pairs[0]?.kappa).toBeCloseTo(14 / 32, 12)
    expect(found?.pairs[0]?.kappaInterval).not.toBeNull()
  })

  it('points out three activities told differently', () => {
    const [found] = compareInformants([
      answered('R R R L L L L L L L'),
      answered('L', { informant: 'therapist' }),
    ])
    expect(found?.pairs[0]).toMatchObject({ discrepancies: 3, pointedOut: true })
  })

  it('counts blanks and what is not done yet as no disagreement, but either hand against left as one', () => {
    const [found] = compareInformants([
      answered('L L L L L L L L L L'),
      answered('- N B L L L L L L L', { informant: 'teacher' }),
    ])
    expect(found?.pairs[0]).toMatchObject({ compared: 8, discrepancies: 1 })
    expect(found?.items.map(({ differs }) => differs).slice(0, 3)).toEqual([false, false, true])
  })

  it('treats always and mostly as the same side', () => {
    const [found] = compareInformants([answered('LL'), answered('L', { informant: 'teacher' })])
    expect(found?.pairs[0]).toMatchObject({ discrepancies: 0, share: 1, kappa: null, kappaInterval: null })
    expect(found?.pairs[0]?.note).toContain('one and the same answer throughout')
  })

  // Kappa without an interval by hand: all alike is 1; one constant answer makes observed and by chance the same, 0;
  // two answers exactly exchanged is (0 − 1/2) ÷ (1 − 1/2) = −1. All of it follows from Cohen 1960.
  it.each([
    ['all alike', 'L L L L L L R R R R', 'L L L L L L R R R R', 1, /^Agreement on all 10 activities;/],
    ['none alike, each one answer', 'L', 'R', 0, /^They agree on none/],
    ['none alike, one of them one answer', 'L', 'R R R R R B B B B B', 0, /^They agree on none/],
    ['none alike, exchanged', 'L L L L L R R R R R', 'R R R R R L L L L L', -1, /^They agree on none/],
    [
      'some alike, one answer throughout',
      'L',
      'L L L L L L R R R R',
      0,
      /^One of the two gave the same answer/,
    ],
  ])('says why kappa has no interval: %s', (_, one, other, kappa, note) => {
    const [found] = compareInformants([answered(one), answered(other, { informant: 'teacher' })])
    expect(found?.pairs[0]?.kappa).toBeCloseTo(kappa, 12)
    expect(found?.pairs[0]?.kappaInterval).toBeNull()
    expect(found?.pairs[0]?.note).toMatch(note)
  })

  it('makes a pair of each two of three informants', () => {
    const [found] = compareInformants([
      answered('L'),
      answered('L', { informant: 'teacher' }),
      answered('R', { informant: 'child_demonstrated' }),
    ])
    expect(found?.pairs.map(({ one, other, discrepancies }) => [one, other, discrepancies])).toEqual([
      ['guardian', 'teacher', 0],
      ['guardian', 'child_demonstrated', 10],
      ['teacher', 'child_demonstrated', 10],
    ])
  })

  it('compares nothing across different forms or when one informant stands alone', () => {
    expect(compareInformants([answered('L')])).toEqual([])
    expect(
      compareInformants([
        answered('L'),
        answered('L', { informant: 'therapist', form: formNamed('ten-task') }),
      ]),
    ).toEqual([])
  })

  it('says so when the editions answered differ', () => {
    const newer = { ...formNamed('hand-use-10'), id: 'hand-use-10.v2', edition: 2 }
    const [found] = compareInformants([answered('L'), answered('L', { informant: 'teacher', form: newer })])
    expect(found?.caution).toContain('same edition')
  })

  it('does not care in which order the answers come', () => {
    const one = answered('L L R B N - L R R L')
    const other = answered('L R R L L L B R N L', { informant: 'teacher' })
    fc.assert(
      fc.property(fc.shuffledSubarray([one, other], { minLength: 2 }), (responses) => {
        expect(compareInformants(responses)).toEqual(compareInformants([one, other]))
      }),
    )
  })
})
