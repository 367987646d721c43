import { describe, expect, it } from 'vitest'
import { measureKinds, type MeasureDetails, type MeasureKind } from '../../shared/measures.ts'
import { measureDetailsSchema, measureDraftSchema } from '../../shared/measureSchemas.ts'
import {
  emptyDetails,
  hasFindings,
  lockProblems,
  methodVersions,
  scoreMeasure,
} from '../../shared/measureScores.ts'

/** The smallest thing that counts, for each kind. */
const least: Record<MeasureKind, (empty: MeasureDetails) => object> = {
  reaching: (empty) => ({ ...empty, reaches: [{ place: 7, hand: 'left', swapped: false }] }),
  pegs: (empty) => ({ ...empty, trials: [taken(20)] }),
  tapping: (empty) => ({ ...empty, trials: [taken(40)] }),
  dots: (empty) => ({ ...empty, trials: [taken(30)] }),
  sides: (empty) => ({ ...empty, ear: { listen: [null, null, 'mixed'], phone: [null, null, null] } }),
  seating: (empty) => ({ ...empty, feetFlat: 'no' }),
}
const taken = (value: number) => ({ hand: 'left', value, interrupted: false, confirmed: false })
// With seed 5 the first card lies at place 7 (see reaching.test.ts).
const empty = (kind: MeasureKind) => emptyDetails(kind, {}, 5)

describe.each(measureKinds)('%s', (kind) => {
  it('begins valid, with nothing found, and with a score of its kind', async () => {
    await measureDetailsSchema.validate(empty(kind), { strict: true })
    expect(hasFindings(empty(kind))).toBe(false)
    expect(scoreMeasure(empty(kind)).kind).toBe(kind)
    expect(methodVersions[kind]).toMatch(/\.v1$/)
  })

  it('may be locked with the least that counts or with a reason, not with both or neither', async () => {
    const found = least[kind](empty(kind)) as MeasureDetails
    await measureDetailsSchema.validate(found, { strict: true })
    expect(hasFindings(found)).toBe(true)
    expect(lockProblems(found, null)).toEqual({})
    expect(lockProblems(empty(kind), 'Tired today')).toEqual({})
    expect(Object.keys(lockProblems(found, 'Tired today'))).toEqual(['notDoneReason'])
    expect(Object.keys(lockProblems(empty(kind), null))).toEqual(['details'])
  })
})

describe('emptyDetails', () => {
  it('lets the lot decide who starts where nobody did', () => {
    expect(emptyDetails('pegs', {}, 4)).toMatchObject({ startHand: 'left', pegs: 10, seconds: null })
    expect(emptyDetails('pegs', {}, 5)).toMatchObject({ startHand: 'right' })
    expect(emptyDetails('dots', { startHand: 'left', seconds: 30 }, 5)).toMatchObject({
      startHand: 'left',
      seconds: 30,
    })
  })
})

describe('measureDraftSchema', () => {
  it('refuses what says no kind, whatever else it is', async () => {
    for (const details of [undefined, null, 5, [], {}, { kind: 'strength' }, { kind: '__proto__' }])
      await expect(
        measureDraftSchema.validate(
          { measuredOn: '2026-06-09', details, notDoneReason: null, comment: null },
          { strict: true },
        ),
        JSON.stringify(details),
      ).rejects.toThrow(/details|kind/)
  })

  it('meets parts that are missing or malformed without falling over', async () => {
    for (const details of [
      { kind: 'reaching', seed: 1, cardsPerPlace: 3, reaches: [null, 4, {}] },
      { kind: 'reaching', seed: '1', cardsPerPlace: 3, reaches: {} },
      { kind: 'pegs', trials: [null] },
      { kind: 'tapping', seconds: 20, pegs: null, startHand: 'left', trials: null },
      { kind: 'sides', foot: null, eye: [], ear: 'left' },
      { kind: 'seating', elbowHeightCm: '20', shoulderHeightCm: {} },
    ])
      await expect(
        measureDetailsSchema.validate(details, { strict: true, abortEarly: false }),
        details.kind,
      ).rejects.toMatchObject({ name: 'ValidationError' })
  })
})
