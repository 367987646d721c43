import { describe, expect, it } from 'vitest'
import { offeredAdvice } from '../../shared/advice.ts'
import { unknownFacts, type AdviceFacts } from '../../shared/adviceFacts.ts'
import { adviceFactsFromRecord, type AdviceRecord } from '../../shared/adviceFactsFromRecord.ts'
import type { HandUseAnswer } from '../../shared/handUse.ts'
import type { SampleDetails } from '../../shared/samples.ts'
import type { WritingObservationDetails } from '../../shared/writingObservations.ts'

const nothingKnown: AdviceRecord = {
  today: '2026-12-01',
  birthDate: '2018-08-01',
  writingHand: null,
  scriptDirection: null,
  concerns: [],
  observation: null,
  handUse: null,
  sample: null,
  goals: [],
}

const notLookedAt: WritingObservationDetails = {
  observedOn: '2026-11-20',
  writingHand: null,
  paperOffsetCm: null,
  paperTiltDegrees: null,
  otherHandSteadies: null,
  wristPosture: null,
  wristExtensionDegrees: null,
  grip: null,
  fingerToTipMm: null,
  pressure: null,
  minutesWritten: null,
  painBefore: null,
  painAfter: null,
  deskType: null,
  elbowClash: null,
  leftClearanceCm: null,
  lightSide: null,
  feetFlat: null,
  deskAboveElbowCm: null,
  note: null,
}

const notCounted: SampleDetails = {
  takenOn: '2026-11-20',
  task: 'copy',
  script: 'print',
  seconds: null,
  letters: null,
  legibleLetters: null,
  reversals: null,
  smudge: null,
  lineAdherence: null,
  otherChildVisible: false,
  note: null,
}

const facts = (known: Partial<AdviceRecord>) => adviceFactsFromRecord({ ...nothingKnown, ...known })

describe('adviceFactsFromRecord', () => {
  it('knows the age and nothing else of an empty record: eight years and four months are 100 months', () => {
    expect(facts({})).toEqual({ ...unknownFacts, ageMonths: 100 })
  })

  it('leaves every fact null when a form was kept but nothing on it was looked at', () => {
    const record = facts({
      observation: notLookedAt,
      sample: notCounted,
      handUse: { draws_writes: null, scissors: 'does_not_do' },
    })
    expect(record).toEqual({ ...unknownFacts, ageMonths: 100 })
  })

  it('gives no age for a birth date after today, so that nothing is offered', () => {
    const record = facts({ birthDate: '2026-12-02', writingHand: 'left' })
    expect(record.ageMonths).toBeNull()
    expect(offeredAdvice(record, 'teacher')).toEqual([])
  })

  it.each<[string, HandUseAnswer | null, AdviceFacts['cuttingHand']]>([
    ['always left', 'strong_left', 'left'],
    ['mostly left', 'left', 'left'],
    ['either hand', 'either', 'swaps'],
    ['mostly right', 'right', 'right'],
    ['always right', 'strong_right', 'right'],
    ['does not do it yet', 'does_not_do', null],
    ['not answered', null, null],
  ])('reads the cutting hand off the questionnaire: %s', (_what, answer, hand) => {
    expect(facts({ handUse: { scissors: answer } }).cuttingHand).toBe(hand)
  })

  it.each<[string, Partial<AdviceRecord>, AdviceFacts['writingHand']]>([
    [
      'the therapist’s word before what was seen and answered',
      {
        writingHand: 'left',
        observation: { ...notLookedAt, writingHand: 'right' },
        handUse: { draws_writes: 'strong_right' },
      },
      'left',
    ],
    [
      'what was seen before what was answered',
      { observation: { ...notLookedAt, writingHand: 'left' }, handUse: { draws_writes: 'strong_right' } },
      'left',
    ],
    ['the answer when nothing else is known', { handUse: { draws_writes: 'left' } }, 'left'],
    ['the answer of a form that asks of writing alone', { handUse: { write: 'strong_right' } }, 'right'],
    ['nothing when nothing is known', {}, null],
  ])('takes the writing hand from %s', (_what, known, hand) => {
    expect(facts(known).writingHand).toBe(hand)
  })

  it('turns yes and no into true and false, and keeps zero apart from not measured', () => {
    const seen = facts({
      observation: { ...notLookedAt, elbowClash: 'yes', feetFlat: 'no', paperOffsetCm: 0, painAfter: 0 },
    })
    expect(seen).toMatchObject({
      elbowClash: true,
      feetFlat: false,
      paperOffsetCm: 0,
      painAfter: 0,
      paperTiltDegrees: null,
      leftClearanceCm: null,
    })
  })

  // 84 letters in 180 s are 28 a minute; 63 of 84 readable are 75 %.
  it('works out speed and legibility of the sample', () => {
    const sample = { ...notCounted, letters: 84, seconds: 180, legibleLetters: 63, smudge: 'light' as const }
    expect(facts({ sample })).toMatchObject({ lettersPerMinute: 28, legiblePercent: 75, smudge: 'light' })
  })

  it('names each goal topic once, in words of the goals', () => {
    const goals = ['Writes a shopping list', 'Writes for ten minutes without pain', 'Cuts out a star']
    expect(facts({ goals }).goalTopics).toEqual(['handwriting', 'pain', 'scissors'])
  })

  it('carries the concerns of the referral over as they are', () => {
    expect(facts({ concerns: ['seating', 'speed'] }).concerns).toEqual(['seating', 'speed'])
  })

  // The triggers as the clinic's advice library sets them (tests/shared/advice.test.ts checks each).
  it.each<[string, Partial<AdviceRecord>, string[]]>([
    [
      'elbows that meet at a desk for two',
      { observation: { ...notLookedAt, elbowClash: 'yes', deskType: 'double' } },
      ['S01', 'X04'],
    ],
    [
      'a page right of the middle, turned the other way',
      { observation: { ...notLookedAt, paperOffsetCm: 6, paperTiltDegrees: -10 } },
      ['W01', 'W02', 'X04'],
    ],
    [
      'little space on the left and light from the left',
      { observation: { ...notLookedAt, leftClearanceCm: 25, lightSide: 'left' } },
      ['S02', 'S04', 'X04'],
    ],
    ['cutting with the left hand', { handUse: { scissors: 'left' } }, ['T01', 'T05', 'X04']],
    ['a smudged sample', { sample: { ...notCounted, smudge: 'heavy' } }, ['W05', 'T09', 'T10', 'X04']],
  ])('calls for the items of the library: %s', (_what, known, ids) => {
    const record = facts({ writingHand: 'left', scriptDirection: 'ltr', ...known })
    expect(offeredAdvice(record, 'teacher').map(({ item }) => item.id)).toEqual(ids)
  })
})
