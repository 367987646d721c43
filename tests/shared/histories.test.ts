import { describe, expect, it } from 'vitest'
import { ValidationError } from 'yup'
import {
  emptyHistory,
  historyDayProblems,
  historyDetailsSchema,
  type HistoryDetails,
} from '../../shared/histories.ts'
import {
  answerTo,
  isAsked,
  missingAnswers,
  missingRequired,
  withAnswer,
  withName,
} from '../../shared/historyAnswers.ts'
import { historyGroups, historyQuestions } from '../../shared/historyQuestions.ts'
import { readingLevel, readingTarget } from '../../shared/readingLevel.ts'
import { checkWording } from '../../shared/wording.ts'

const history = (given: Partial<HistoryDetails> = {}): HistoryDetails => ({ ...emptyHistory, ...given })

const problemsOf = (details: unknown): string[] => {
  try {
    historyDetailsSchema.validateSync(details, { strict: true, abortEarly: false })
    return []
  } catch (error) {
    if (!(error instanceof ValidationError)) throw error
    return [...new Set(error.inner.map(({ path }) => path ?? ''))]
  }
}

describe('the schema of a history', () => {
  it('takes a history in which nothing is answered', () => {
    expect(problemsOf(emptyHistory)).toEqual([])
  })

  it.each([
    ['gestationWeeks', 22, 44],
    ['firstNoticedMonths', 0, 168],
    ['askedToSwitchAge', 0, 17],
    ['pain', 0, 10],
  ] as const)('keeps %s between %d and %d, whole numbers only', (field, lowest, highest) => {
    for (const kept of [lowest, highest]) expect(problemsOf(history({ [field]: kept }))).toEqual([])
    for (const refused of [lowest - 1, highest + 1, lowest + 0.5, `${lowest}`])
      expect(problemsOf(history({ [field]: refused })), String(refused)).toEqual([field])
  })

  it('keeps no more left-handed brothers and sisters than there are', () => {
    const family = { ...emptyHistory.family, siblings: 2, leftHandedSiblings: 3 }
    expect(problemsOf(history({ family }))).toEqual(['family.leftHandedSiblings'])
    expect(problemsOf(history({ family: { ...family, leftHandedSiblings: 2 } }))).toEqual([])
  })

  it.each([
    ['an answer nobody offers', { handChanged: 'maybe' }, 'handChanged'],
    ['yes as true', { handChanged: true }, 'handChanged'],
    ['a day that is none', { injuryOn: '2026-02-30' }, 'injuryOn'],
    ['a text that is too long', { enjoys: 'x'.repeat(1001) }, 'enjoys'],
    ['a field left out', { pain: undefined }, 'pain'],
    ['a field of its own', { diagnosis: 'none' }, ''],
  ])('refuses %s', (_what, given, path) => {
    expect(problemsOf({ ...emptyHistory, ...given })).toEqual([path])
  })

  it('names days that lie ahead or before birth, beside their field', () => {
    const life = { birthDate: '2018-05-04', today: '2026-06-10' }
    const of = (given: Partial<HistoryDetails>) => Object.keys(historyDayProblems(history(given), life))
    expect(of({ handChangedOn: '2026-06-10', injuryOn: '2018-05-04' })).toEqual([])
    expect(of({ handChangedOn: '2026-06-11', injuryOn: '2018-05-03' })).toEqual(['handChangedOn', 'injuryOn'])
  })
})

describe('the questions', () => {
  it('have a place in the details for every field, once', () => {
    const fields = Object.keys(emptyHistory).filter((key) => key !== 'family' && !key.endsWith('Unsure'))
    const familyFields = Object.keys(emptyHistory.family)
      .filter((key) => !key.endsWith('Unsure'))
      .map((key) => `family.${key}`)
    const ids = historyQuestions.map(({ id }) => id)
    expect(ids.toSorted()).toEqual([...fields, ...familyFields].toSorted())
  })

  it('come in small groups', () => {
    for (const { id, questions } of historyGroups) expect(questions.length, id).toBeLessThanOrEqual(8)
  })

  it('are written kindly, plainly and without a diagnosis', () => {
    const words = historyGroups.flatMap(({ title, intro, questions }) => [
      title,
      intro ?? '',
      ...questions.flatMap(({ label, hint, why }) => [label, hint ?? '', why ?? '']),
    ])
    const text = withName(words.filter((part) => part !== '').join('. '), 'Robin')
    expect(text).not.toMatch(/palsy|stroke|dyspraxia|DCD|epilep|hemi|tumou?r|disorder|abnormal|dominance/i)
    expect(text).not.toContain('{name}')
    expect(checkWording(text)).toEqual([])
    expect(readingLevel(text).grade).toBeLessThanOrEqual(readingTarget.idealUpTo)
  })

  it('say why a question is asked where it could alarm', () => {
    const said = (group: string, question?: string) => {
      const found = historyGroups.find(({ id }) => id === group)
      return question ? found?.questions.find(({ id }) => id === question)?.why : found?.intro
    }
    for (const reason of [said('new-signs'), said('other-hand'), said('changes', 'punishedForHand')])
      expect(reason).toMatch(/we ask|helps us|tells us/i)
  })
})

describe('what is missing', () => {
  const everything = history({
    gestationUnsure: true,
    firstNoticedUnsure: true,
    consistency: 'unsure',
    askedToSwitch: 'no',
    punishedForHand: 'no',
    family: { ...emptyHistory.family, mother: 'unsure', father: 'unsure', siblingsUnsure: true, twin: 'no' },
    handChanged: 'no',
    injury: 'no',
    seizure: 'no',
    newWeakness: 'no',
    numbness: 'no',
    faceDroop: 'no',
    newHeadache: 'no',
    walkChanged: 'no',
    lostSkill: 'unsure',
    otherHandHardlyUsed: 'no',
    otherHandFisted: 'no',
    dropsThings: 'unsure',
    weakerSide: 'no',
    satInTime: 'unsure',
    walkedInTime: 'unsure',
    tremor: 'no',
    wideMotorDifficulty: 'no',
    visionChecked: 'yes',
    hearingChecked: 'yes',
    painUnsure: true,
    enjoys: 'Building dens',
    childsWords: 'I like my blue pen',
  })

  it('is nothing when every question is answered, "not sure" included', () => {
    expect(missingAnswers(everything)).toEqual([])
  })

  it('is what was left open: unanswered is not "not sure"', () => {
    expect(missingAnswers({ ...everything, tremor: null, painUnsure: false })).toEqual(['tremor', 'pain'])
  })

  it('counts a zero as an answer', () => {
    expect(missingAnswers({ ...everything, painUnsure: false, pain: 0 })).toEqual([])
  })

  it('asks on where an answer calls for it, and not otherwise', () => {
    expect(missingAnswers({ ...everything, handChanged: 'yes' })).toEqual(['handChangedOn'])
    expect(missingAnswers({ ...everything, handChanged: 'yes', handChangedOnUnsure: true })).toEqual([])
    expect(missingAnswers({ ...everything, injury: 'yes' })).toEqual(['injuryWhat', 'injuryOn'])
    expect(missingAnswers({ ...everything, tremor: 'yes' })).toEqual(['tremorSudden'])
    expect(missingAnswers({ ...everything, painUnsure: false, pain: 1 })).toEqual(['painWhere'])
    expect(missingAnswers({ ...everything, askedToSwitch: 'yes' })).toEqual(['askedToSwitchBy'])
  })

  it('asks whether an early preference was steady only below 18 months from the due date', () => {
    const steady = historyQuestions.find(({ id }) => id === 'earlySteady')!
    const asked = (firstNoticedMonths: number | null, gestationWeeks: number | null) =>
      isAsked(history({ firstNoticedMonths, gestationWeeks }), steady)
    expect([asked(null, null), asked(17, null), asked(18, null)]).toEqual([false, true, false])
    // 28 weeks: 12 weeks early, about 2.8 months.
    expect([asked(20, 28), asked(21, 28)]).toEqual([true, false])
  })

  it('names what the history cannot be sent without', () => {
    expect(missingRequired(emptyHistory)).toEqual(['enjoys'])
    expect(missingRequired(everything)).toEqual([])
  })
})

describe('an answer in its place', () => {
  it('is found again, in the family too, and leaves the rest alone', () => {
    const told = withAnswer(withAnswer(emptyHistory, 'family.mother', 'left'), 'pain', 3)
    expect([answerTo(told, 'family.mother'), answerTo(told, 'pain'), answerTo(told, 'enjoys')]).toEqual([
      'left',
      3,
      null,
    ])
    expect(withAnswer(withAnswer(told, 'family.mother', null), 'pain', null)).toEqual(emptyHistory)
  })
})
