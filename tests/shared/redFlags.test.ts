import { describe, expect, it } from 'vitest'
import {
  correctedMonths,
  earlyHandPreferenceFlag,
  redFlags,
  lossOfSkillFlag,
  tremorFlag,
} from '../../shared/redFlags.ts'
import { unknownHistory, type RedFlagHistory } from '../../shared/redFlagHistory.ts'
import { checkWording } from '../../shared/wording.ts'

const raised = (known: Partial<RedFlagHistory>) =>
  redFlags({ ...unknownHistory, ...known }).map(({ id, urgency }) => `${id}: ${urgency}`)

// NICE NG127 (2019) as summarised on a clinicians' reference page: refer before 1 year corrected. Canadian
// early-detection prompts: before 12 months. The 12 to 18 months band comes from patient pages: sources differ.
describe('earlyHandPreferenceFlag', () => {
  it.each([
    ['RED-01', 10, true, 'refer'],
    ['RED-02', 11.9, true, 'refer'],
    ['RED-03', 12, true, 'watch'],
    ['just below 18', 17.9, true, 'watch'],
    ['RED-05', 18, true, 'none'],
    ['RED-06', 10, false, 'none'],
    ['not known whether steady', 10, null, 'refer'],
    ['not known when', null, true, 'none'],
  ])('%s', (_id, months, consistent, expected) => {
    expect(earlyHandPreferenceFlag(months, consistent)).toBe(expected)
  })

  it('uses the corrected age: 14 months born at 28 weeks are about 11.2', () => {
    expect(correctedMonths(14, 28)).toBeCloseTo(11.24, 2)
    expect(correctedMonths(14, 38)).toBe(14)
    expect(correctedMonths(14, null)).toBe(14)
  })
})

// Same guideline summary: loss of a skill at any age; tremor urgent if sudden or with other neurological signs.
describe('loss of skill and tremor', () => {
  it('RED-07: a lost skill asks for a referral at any age', () => {
    expect(lossOfSkillFlag(true)).toBe('refer')
    expect(lossOfSkillFlag(null)).toBe('none')
  })

  it.each([
    ['RED-08', true, true, false, 'urgent'],
    ['with other signs', true, false, true, 'urgent'],
    ['RED-09', true, false, false, 'therapy_if_it_affects_daily_tasks'],
    ['none', false, true, true, 'none'],
    ['not known', null, null, null, 'none'],
  ])('%s', (_id, tremor, sudden, signs, expected) => {
    expect(tremorFlag(tremor, sudden, signs)).toBe(expected)
  })
})

// The clinic's table of red flags; rows from memory or clinical consensus carry that in their source.
describe('redFlags', () => {
  it.each([
    [
      { firstPreferenceMonths: 8, otherHandFisted: true },
      ['preference-before-12-months: priority', 'other-hand-or-lost-skill: medical_review'],
    ],
    [{ firstPreferenceMonths: 14, gestationWeeks: 28 }, ['preference-before-12-months: priority']],
    [{ firstPreferenceMonths: 14, gestationWeeks: 40 }, ['preference-12-to-18-months: ask']],
    [{ firstPreferenceMonths: 24 }, []],
    [{ handChanged: true, newWeakness: true, newHeadache: true }, ['new-neurological-signs: same_day']],
    [{ newWeakness: true, armInjury: true }, ['new-neurological-signs: same_day']],
    [{ seizure: true }, ['new-neurological-signs: same_day']],
    [{ newHeadache: true, handChanged: false }, ['new-headaches: medical_review']],
    [{ newHeadache: true }, ['new-headaches: medical_review']],
    [{ newHeadache: true, handChanged: true }, ['new-neurological-signs: same_day']],
    [{ newHeadache: true, handMayHaveChanged: true }, ['new-neurological-signs: same_day']],
    [{ newHeadache: null, handMayHaveChanged: true }, []],
    [{ newHeadache: false, lostSkill: true }, ['other-hand-or-lost-skill: medical_review']],
    [
      { newHeadache: true, lostSkill: true },
      ['new-neurological-signs: same_day', 'other-hand-or-lost-skill: medical_review'],
    ],
    [
      { newHeadache: true, weakerSide: true },
      ['new-neurological-signs: same_day', 'other-hand-or-lost-skill: medical_review'],
    ],
    [{ newHeadache: true, tremor: true }, ['new-neurological-signs: same_day', 'tremor: ask']],
    [
      { newHeadache: true, walkChanged: true },
      ['new-neurological-signs: same_day', 'walk-changed: same_day'],
    ],
    [
      { newHeadache: true, dropsThings: true },
      ['new-headaches: medical_review', 'other-hand-or-lost-skill: medical_review'],
    ],
    [{ handChanged: true, armInjury: true }, ['change-of-hand: medical_review']],
    [{ handChanged: true }, ['change-of-hand: medical_review']],
    [{ lostSkill: true }, ['other-hand-or-lost-skill: medical_review']],
    [{ dropsThings: true }, ['other-hand-or-lost-skill: medical_review']],
    [{ tremor: true, tremorSudden: true }, ['sudden-tremor: same_day']],
    [{ tremor: true }, ['tremor: ask']],
    [{ swapsWithinTask: true, ageMonths: 72 }, ['swaps-within-task: ask']],
    [{ swapsWithinTask: true, ageMonths: 71 }, []],
    [{ swapsWithinTask: true }, []],
    [{ wideMotorDifficulty: true }, ['wide-motor-difficulty: ask']],
    [{ painAfter: 4 }, ['pain: safeguarding']],
    [{ painAfter: 3 }, []],
    [{ punishedForHand: true }, ['punished-for-hand: safeguarding']],
    [{ notBroughtInSixMonths: 2 }, ['not-brought: safeguarding']],
    [{ notBroughtInSixMonths: 1 }, []],
  ] as [Partial<RedFlagHistory>, string[]][])('%j raises %j', (known, expected) => {
    expect(raised(known)).toEqual(expected)
  })

  it('raises nothing from what is not known', () => {
    expect(redFlags(unknownHistory)).toEqual([])
  })

  it('puts the most urgent first', () => {
    expect(
      raised({ painAfter: 6, punishedForHand: true, faceDroop: true, firstPreferenceMonths: 9 }),
    ).toEqual([
      'new-neurological-signs: same_day',
      'preference-before-12-months: priority',
      'punished-for-hand: safeguarding',
      'pain: safeguarding',
    ])
  })

  it('names no diagnosis, defers to local guidance, and says when the age is not corrected', () => {
    const all = redFlags({
      ...unknownHistory,
      firstPreferenceMonths: 9,
      handChanged: true,
      newWeakness: true,
      lostSkill: true,
      tremor: true,
      tremorSudden: true,
      punishedForHand: true,
      notBroughtInSixMonths: 3,
      wideMotorDifficulty: true,
      swapsWithinTask: true,
      ageMonths: 90,
      painAfter: 7,
    })
    const words = all.map((flag) => `${flag.words} ${flag.action}`).join(' ')
    expect(words).not.toMatch(/palsy|stroke|dyspraxia|DCD|epilep|hemi|tumou?r|disorder/i)
    expect(checkWording(words)).toEqual([])
    const sameDay = all.filter(({ urgency }) => urgency === 'same_day')
    expect(sameDay).toHaveLength(2)
    for (const { action } of sameDay) expect(action).toContain('local emergency guidance')
    expect(all.find(({ id }) => id === 'preference-before-12-months')!.words).toContain('not corrected')
  })
})
