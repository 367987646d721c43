import { describe, expect, it } from 'vitest'
import { emptyHistory, type HistoryDetails } from '../../shared/histories.ts'
import { redFlagIds, redFlagRows } from '../../shared/redFlagRows.ts'
import { newlyRaised } from '../../shared/redFlags.ts'
import {
  redFlagsOfHistory,
  redFlagsOfObservation,
  redFlagsOfSkill,
  redFlagsOfVisits,
  urgentWordsFor,
} from '../../shared/redFlagSources.ts'
import type { HandSkill } from '../../shared/skillGap.ts'
import { checkWording } from '../../shared/wording.ts'

const eight = { ageMonths: 100, writingHand: 'left' } as const
const history = (given: Partial<HistoryDetails>): HistoryDetails => ({ ...emptyHistory, ...given })
const raised = (given: Partial<HistoryDetails>, child: Parameters<typeof redFlagsOfHistory>[1] = eight) =>
  redFlagsOfHistory(history(given), child).map(({ id }) => id)
const ids = (flags: readonly { id: string }[]) => flags.map(({ id }) => id)

/*
 * The clinic's table, row by row. Sources stand in the rows: NICE NG127 (2019) and early-detection prompts for early
 * preference, loss of skill and the other hand; Bhate & Ganesan 2015 for new weakness; Darvik et al. 2018 for wide motor
 * difficulty; the rest from memory or the clinic's own, as the rows say.
 */
describe('flags of a history', () => {
  it.each([
    // One-hand preference before 12 months (corrected), 12 to 18 months
    [{ firstNoticedMonths: 11 }, ['preference-before-12-months']],
    [{ firstNoticedMonths: 12 }, ['preference-12-to-18-months']],
    [{ firstNoticedMonths: 17 }, ['preference-12-to-18-months']],
    [{ firstNoticedMonths: 18 }, []],
    // Born at 32 weeks: 8 weeks early, 1.84 months. 13 months are 11.2, 14 are 12.2; 19 are 17.2, 20 are 18.2.
    [{ firstNoticedMonths: 13, gestationWeeks: 32 }, ['preference-before-12-months']],
    [{ firstNoticedMonths: 14, gestationWeeks: 32 }, ['preference-12-to-18-months']],
    [{ firstNoticedMonths: 19, gestationWeeks: 32 }, ['preference-12-to-18-months']],
    [{ firstNoticedMonths: 20, gestationWeeks: 32 }, []],
    // 37 weeks is not early.
    [{ firstNoticedMonths: 12, gestationWeeks: 37 }, ['preference-12-to-18-months']],
    [{ firstNoticedMonths: 12, gestationWeeks: 36 }, ['preference-before-12-months']],
    [{ firstNoticedMonths: 8, earlySteady: 'no' }, []],
    [{ firstNoticedMonths: 8, earlySteady: 'unsure' }, ['preference-before-12-months']],
    [{ firstNoticedUnsure: true }, []],
    // Change of hand with new weakness, numbness, face droop, headache, seizure
    [{ handChanged: 'yes', newWeakness: 'yes' }, ['new-neurological-signs']],
    [{ numbness: 'yes' }, ['new-neurological-signs']],
    [{ faceDroop: 'yes' }, ['new-neurological-signs']],
    [{ seizure: 'yes' }, ['new-neurological-signs']],
    [{ handChanged: 'yes', newHeadache: 'yes' }, ['new-neurological-signs']],
    // Headaches: a doctor looks; with another sign, or a change of hand nobody is sure of, on the same day
    [{ newHeadache: 'yes' }, ['new-headaches']],
    [{ newHeadache: 'unsure' }, []],
    [{ newHeadache: 'unsure', handChanged: 'unsure' }, []],
    [{ newHeadache: 'yes', handChanged: 'no' }, ['new-headaches']],
    [{ newHeadache: 'yes', handChanged: 'unsure' }, ['new-neurological-signs']],
    [{ newHeadache: 'yes', lostSkill: 'yes' }, ['new-neurological-signs', 'other-hand-or-lost-skill']],
    [{ newHeadache: 'yes', weakerSide: 'yes' }, ['new-neurological-signs', 'other-hand-or-lost-skill']],
    [{ newHeadache: 'yes', lostSkill: 'no', weakerSide: 'unsure' }, ['new-headaches']],
    [{ newWeakness: 'yes', injury: 'yes' }, ['new-neurological-signs']],
    [{ newWeakness: 'unsure', numbness: 'unsure', faceDroop: 'unsure', seizure: 'unsure' }, []],
    [{ walkChanged: 'yes' }, ['walk-changed']],
    // Change of hand without those
    [{ handChanged: 'yes' }, ['change-of-hand']],
    [{ handChanged: 'yes', injury: 'yes' }, ['change-of-hand']],
    [{ handChanged: 'no', injury: 'yes' }, []],
    // The other hand
    [{ otherHandHardlyUsed: 'yes' }, ['other-hand-or-lost-skill']],
    [{ otherHandFisted: 'yes' }, ['other-hand-or-lost-skill']],
    [{ dropsThings: 'yes' }, ['other-hand-or-lost-skill']],
    [{ lostSkill: 'yes' }, ['other-hand-or-lost-skill']],
    [{ weakerSide: 'yes' }, ['other-hand-or-lost-skill']],
    [{ otherHandHardlyUsed: 'no', otherHandFisted: 'no', dropsThings: 'unsure' }, []],
    // Tremor
    [{ tremor: 'yes' }, ['tremor']],
    [{ tremor: 'yes', tremorSudden: 'yes' }, ['sudden-tremor']],
    [{ tremor: 'yes', numbness: 'yes' }, ['new-neurological-signs', 'sudden-tremor']],
    // NG127 as summarised: a tremor with other neurological signs is urgent.
    [{ tremor: 'yes', newHeadache: 'yes' }, ['new-neurological-signs', 'sudden-tremor']],
    [{ tremor: 'no', tremorSudden: 'yes' }, []],
    // Milestones, from the due date
    [{ satInTime: 'no' }, ['late-milestones']],
    [{ walkedInTime: 'no' }, ['late-milestones']],
    [{ satInTime: 'yes', walkedInTime: 'unsure' }, []],
    // Welfare
    [{ punishedForHand: 'yes' }, ['punished-for-hand']],
    [{ askedToSwitch: 'yes' }, []],
    [{ pain: 3 }, []],
    [{ pain: 4 }, ['pain']],
    [{ pain: 0 }, []],
    [{ consistency: 'swaps_within_task' }, ['swaps-within-task']],
    [{ consistency: 'swaps_between_tasks' }, []],
    [{ wideMotorDifficulty: 'yes' }, ['wide-motor-difficulty']],
    [{}, []],
  ] as [Partial<HistoryDetails>, string[]][])('%j raises %j', (given, expected) => {
    expect(raised(given)).toEqual(expected)
  })

  it('of a change of hand within a job stands from six years on', () => {
    const at = (ageMonths: number | null) =>
      raised({ consistency: 'swaps_within_task' }, { ageMonths, writingHand: null })
    expect([at(71), at(72), at(null)]).toEqual([[], ['swaps-within-task'], []])
  })

  // FACT-3: Front Psychol 2018, 9:1948 (title and abstract read; authors from memory).
  it('of wide motor difficulty states the published shares as an association', () => {
    expect(redFlagRows['wide-motor-difficulty'].source).toMatch(/14\.7 %.*8\.1 %.*association, not a cause/)
  })

  it('of wide motor difficulty is for left-handers and those who have no settled hand', () => {
    const of = (writingHand: 'left' | 'right' | 'swaps' | null) =>
      raised({ wideMotorDifficulty: 'yes' }, { ageMonths: 100, writingHand })
    expect([of('left').length, of('swaps').length, of(null).length, of('right').length]).toEqual([1, 1, 1, 0])
  })

  it('of an infant with a steady hand stand by today’s age, corrected', () => {
    const at = (ageMonths: number, given: Partial<HistoryDetails> = {}) =>
      raised({ consistency: 'mostly', ...given }, { ageMonths, writingHand: null })
    expect(at(10)).toEqual(['preference-before-12-months'])
    expect(at(13)).toEqual(['preference-12-to-18-months'])
    expect(at(13, { gestationWeeks: 30 })).toEqual(['preference-before-12-months'])
    expect(at(18)).toEqual([])
    expect(at(10, { consistency: 'swaps_between_tasks' })).toEqual([])
  })

  it('say from which age they were counted', () => {
    const words = (given: Partial<HistoryDetails>) => redFlagsOfHistory(history(given), eight)[0]?.words
    expect(words({ firstNoticedMonths: 13, gestationWeeks: 32 })).toContain(
      'about 11 months from the due date',
    )
    expect(words({ firstNoticedMonths: 9 })).toContain('not corrected')
    expect(words({ firstNoticedMonths: 9, gestationWeeks: 40 })).toBe(
      'One hand was preferred from about 9 months.',
    )
  })
})

describe('flags of a writing observation', () => {
  const nothing = { writingHand: null, painBefore: null, painAfter: null }
  it.each([
    [{ painAfter: 4 }, eight, ['pain']],
    [{ painAfter: 3, painBefore: 3 }, eight, []],
    [{ painBefore: 4, painAfter: 1 }, eight, ['pain']],
    [{ writingHand: 'right' }, eight, ['change-of-hand']],
    [{ writingHand: 'left' }, eight, []],
    [{ writingHand: 'left' }, { ageMonths: 100, writingHand: null }, []],
    [{ writingHand: 'left' }, { ageMonths: 100, writingHand: 'swaps' }, []],
    [{ writingHand: 'swaps' }, { ageMonths: 72, writingHand: 'left' }, ['swaps-within-task']],
    [{ writingHand: 'swaps' }, { ageMonths: 71, writingHand: 'left' }, []],
  ] as const)('%j of %j raise %j', (seen, child, expected) => {
    expect(ids(redFlagsOfObservation({ ...nothing, ...seen }, child))).toEqual(expected)
  })
})

describe('the words of new headaches', () => {
  const words = (given: Partial<HistoryDetails>) => redFlagsOfHistory(history(given), eight)[0]?.words
  it('name what was told with them, and say where nobody is sure of the change of hand', () => {
    expect(words({ newHeadache: 'yes', handChanged: 'unsure' })).toMatch(
      /^The child may have changed hands, with headaches\./,
    )
    expect(words({ newHeadache: 'yes', tremor: 'yes', lostSkill: 'yes' })).toMatch(
      /^There are headaches\. Told together with the headaches: a lost skill, a tremor\./,
    )
    expect(words({ newHeadache: 'yes', newWeakness: 'yes' })).toMatch(/^There is new weakness, headaches\./)
  })

  it('reach the family as a call for help today only beside another sign', () => {
    expect(urgentWordsFor(history({ newHeadache: 'yes' }))).toEqual([])
    expect(urgentWordsFor(history({ newHeadache: 'yes', handChanged: 'unsure' })).join(' ')).toContain(
      'told us about headaches. Please get medical help today',
    )
  })
})

describe('the words of a change of hand', () => {
  it('say what was seen and told, and no cause that nobody gave', () => {
    const seen = { writingHand: 'right', painBefore: null, painAfter: null } as const
    expect(redFlagsOfObservation(seen, eight)[0]?.words).toBe(
      'The child wrote with the right hand; the record says the left.',
    )
    const told = redFlagsOfHistory(history({ handChanged: 'yes', injury: 'yes' }), eight)[0]?.words
    expect(told).toContain('compare the dates')
    expect(told).not.toMatch(/after (pain|an injury)/)
  })
})

describe('a change of hand in a child who was asked to switch', () => {
  const flag = (given: Partial<HistoryDetails>) => redFlagsOfHistory(history(given), eight)[0]
  it('stays a medical review, whose words name the pressure too', () => {
    const both = flag({ handChanged: 'yes', askedToSwitch: 'yes' })
    expect([both?.id, both?.urgency]).toEqual(['change-of-hand', 'medical_review'])
    expect(both?.words).toContain('Somebody has asked the child to use the other hand')
    expect(checkWording(both?.words ?? '')).toEqual([])
    for (const askedToSwitch of ['no', 'unsure', null] as const)
      expect(flag({ handChanged: 'yes', askedToSwitch })?.words).toBe('The child has changed hands.')
  })

  it('adds the pressure to a sign that stands once it is told', () => {
    const before = redFlagsOfHistory(history({ handChanged: 'yes' }), eight)
    const after = redFlagsOfHistory(history({ handChanged: 'yes', askedToSwitch: 'yes' }), eight)
    expect(ids(newlyRaised(before, after))).toEqual(['change-of-hand'])
  })
})

describe('the flag of skill', () => {
  const skill = (low: number, high: number, given: Partial<HandSkill> = {}): HandSkill => ({
    kind: 'pegs',
    task: 'pegs',
    trials: 3,
    index: (low + high) / 2,
    interval: { low, high },
    ...given,
  })
  const tapping = (low: number, high: number, trials = 3) =>
    skill(low, high, { kind: 'tapping', task: 'tapping', trials })
  const dots = (low: number, high: number, trials = 3) =>
    skill(low, high, { kind: 'dots', task: 'dots', trials })

  // Minus is left better; clear is an interval that does not reach zero.
  it.each([
    ['left', skill(1, 9), ['skill-opposite-writing-hand']],
    ['left', skill(0, 9), []],
    ['left', skill(-9, -1), []],
    ['right', skill(-9, -1), ['skill-opposite-writing-hand']],
    ['right', skill(-9, 0), []],
    ['right', skill(1, 9), []],
    ['swaps', skill(1, 9), []],
    [null, skill(1, 9), []],
    ['left', skill(20, 20, { interval: null }), []],
    ['left', skill(20, 20, { index: null, interval: null }), []],
  ] as const)('writing hand %s, %j: %j', (hand, measured, expected) => {
    expect(ids(redFlagsOfSkill([measured], hand))).toEqual(expected)
  })

  // Dots: the two-humped distribution of adults is absent in 274 people aged 4 to 18 (conference abstract). Tapping:
  // a poor predictor of preference in 233 children (Njiokiktjien et al. 1997). Three trials a hand: clinic rule.
  it.each([
    ['pegs on three trials a hand', [skill(1, 9)], ['pegs']],
    ['pegs on two', [skill(1, 9, { trials: 2 })], []],
    ['dots alone', [dots(1, 9)], []],
    ['dots twice', [dots(1, 9), dots(2, 8)], []],
    ['tapping alone', [tapping(1, 9)], []],
    ['tapping and dots that agree', [tapping(1, 9), dots(1, 9)], ['tapping', 'dots']],
    ['tapping and dots, one of them on two trials', [tapping(1, 9), dots(1, 9, 2)], []],
    ['tapping and dots that disagree', [tapping(1, 9), dots(-9, -1)], []],
    ['tapping with pegs of two trials', [tapping(1, 9), skill(1, 9, { trials: 2 })], []],
    ['pegs with dots that say nothing clear', [skill(1, 9), dots(-1, 9)], ['pegs']],
    ['pegs on the side of the writing hand, tapping on the other', [skill(-9, -1), tapping(1, 9)], []],
  ])('rests on pegs, or on two tasks that agree: %s', (_what, skills, expected) => {
    expect(redFlagsOfSkill(skills, 'left').flatMap(({ signs }) => signs)).toEqual(expected)
  })

  it('names every such task and both hands', () => {
    const [flag] = redFlagsOfSkill([skill(1, 9), tapping(2, 5)], 'left')
    expect(flag?.words).toBe(
      'The child writes with the left hand, and the right hand did clearly better at: pegs, tapping.',
    )
  })
})

describe('the flag of visits', () => {
  it.each([
    [0, []],
    [1, []],
    [2, ['not-brought']],
    [5, ['not-brought']],
  ])('%d times in six months: %j', (times, expected) => {
    expect(ids(redFlagsOfVisits(times))).toEqual(expected)
  })
})

describe('the table', () => {
  it('holds routine booking back where a doctor or a referral comes first, and nowhere else', () => {
    expect(redFlagIds.filter((id) => redFlagRows[id].holdsBooking)).toEqual([
      'new-neurological-signs',
      'sudden-tremor',
      'walk-changed',
      'preference-before-12-months',
      'other-hand-or-lost-skill',
    ])
  })

  it('asks for help on the same day for new signs, and for thought about welfare for pain and punishment', () => {
    const of = (urgency: string) => redFlagIds.filter((id) => redFlagRows[id].urgency === urgency)
    expect(of('same_day')).toEqual(['new-neurological-signs', 'sudden-tremor', 'walk-changed'])
    expect(of('safeguarding')).toEqual(['punished-for-hand', 'pain', 'not-brought'])
  })

  it('fits the record, names no diagnosis and blames no hand', () => {
    for (const row of Object.values(redFlagRows)) {
      expect(row.id.length).toBeLessThanOrEqual(40)
      expect(row.action.length).toBeLessThanOrEqual(500)
      const words = `${row.title}. ${row.action}`
      expect(words).not.toMatch(/palsy|stroke|dyspraxia|DCD|epilep|hemi|tumou?r|disorder/i)
      expect(checkWording(words)).toEqual([])
    }
  })
})

describe('what is new since the last save', () => {
  const of = (given: Partial<HistoryDetails>) => redFlagsOfHistory(history(given), eight)

  it('is a flag, or a further sign under one; not what stood before, nor what was taken back', () => {
    expect(ids(newlyRaised(of({}), of({ seizure: 'yes' })))).toEqual(['new-neurological-signs'])
    expect(ids(newlyRaised(of({ seizure: 'yes' }), of({ seizure: 'yes', pain: 6 })))).toEqual(['pain'])
    expect(ids(newlyRaised(of({ seizure: 'yes' }), of({ seizure: 'yes', numbness: 'yes' })))).toEqual([
      'new-neurological-signs',
    ])
    expect(newlyRaised(of({ seizure: 'yes', numbness: 'yes' }), of({ seizure: 'yes' }))).toEqual([])
    expect(newlyRaised(of({ seizure: 'yes' }), of({}))).toEqual([])
  })

  it.each([
    [3, 4, ['pain']],
    [4, 9, ['pain']],
    [9, 10, ['pain']],
    [9, 9, []],
    [9, 4, []],
    [10, 3, []],
  ])('pain of %d, then %d: %j', (before, after, expected) => {
    expect(ids(newlyRaised(of({ pain: before }), of({ pain: after })))).toEqual(expected)
  })
})

describe('the words for the family', () => {
  it('ask for help today when a sign calls for it, and are silent otherwise', () => {
    const words = urgentWordsFor(history({ newWeakness: 'yes', faceDroop: 'yes' })).join(' ')
    expect(words).toContain('new weakness and a drooping face')
    expect(words).toMatch(/medical help today/)
    expect(words).toMatch(
      /came suddenly or is getting worse, call the emergency number now, even if it came after a fall/,
    )
    expect(words).not.toMatch(/palsy|stroke|epilep|tumou?r/i)
    for (const given of [{}, { lostSkill: 'yes' }, { pain: 9 }, { punishedForHand: 'yes' }] as const)
      expect(urgentWordsFor(history(given))).toEqual([])
  })

  it('name every same-day sign in plain words', () => {
    const words = urgentWordsFor(
      history({ tremor: 'yes', tremorSudden: 'yes', walkChanged: 'yes', seizure: 'yes' }),
    ).join(' ')
    for (const sign of ['a seizure', 'a tremor that came suddenly', 'way of walking'])
      expect(words).toContain(sign)
    expect(words).not.toMatch(/sudden-tremor|walk-changed/)
  })
})
