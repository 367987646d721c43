import { describe, expect, it } from 'vitest'
import { emptyHistory, type HistoryDetails } from '../../shared/histories.ts'
import { flagsInComment, flagsInHistoryWords, readableText } from '../../shared/redFlagWords.ts'

// Rows of the clinic's table; the sentences are our own.
const found = (given: Partial<HistoryDetails>) =>
  flagsInHistoryWords({ ...emptyHistory, ...given }).map(({ id, quotes }) => `${id}: ${quotes.join(', ')}`)

describe('signs in the words of a family', () => {
  it.each<[Partial<HistoryDetails>, string[]]>([
    [{ anythingElse: 'She had a seizure at Easter.' }, ['new-neurological-signs: seizure']],
    [{ anythingElse: 'There were no seizures.' }, []],
    [{ anythingElse: 'No seizures, headaches or pain so far.' }, []],
    [{ childsWords: 'My fingers go numb.' }, ['new-neurological-signs: numb']],
    [
      { lostSkillWhat: 'Buttons, since there is numbness in two fingers.' },
      ['new-neurological-signs: numbness'],
    ],
    [{ lostSkillWhat: 'She used to be able to tie her laces.' }, []],
    [
      { anythingElse: 'She used to be able to tie her laces.' },
      ['other-hand-or-lost-skill: used to be able'],
    ],
    [{ childsWords: 'I hardly use my right hand' }, []],
    [{ anythingElse: 'He hardly uses his right hand.' }, ['other-hand-or-lost-skill: hardly uses his right']],
    [{ anythingElse: 'Her last teacher smacked her fingers.' }, ['punished-for-hand: smacked']],
    [{ anythingElse: 'Now writes with the left.' }, ['change-of-hand: Now writes with the left']],
    // What the question asks for is no news there, and is elsewhere.
    [{ injury: 'yes', injuryWhat: 'Broken left arm, plaster for six weeks' }, []],
    [{ anythingElse: 'Broke her left arm in May' }, ['change-of-hand: Broke her left arm']],
    [{ injury: 'yes', injuryWhat: 'A fall; the hand is numb since' }, ['new-neurological-signs: numb']],
    // How strong it is was answered on the scale.
    [{ pain: 2, painWhere: 'It hurts in the wrist', childsWords: 'It hurts a bit' }, []],
    [{ painUnsure: true, childsWords: 'It hurts when I write' }, ['pain: hurts']],
    [{ firstNoticedMonths: 30, anythingElse: 'Waved with the left hand from 9 months' }, []],
    [{ anythingElse: 'Only the left hand from 9 months' }, ['preference-before-12-months: from 9 months']],
    // Headaches: alone a doctor looks, beside another sign on the same day.
    [{ anythingElse: 'He gets headaches after school' }, ['new-headaches: headaches']],
    [{ handChanged: 'unsure', anythingElse: 'He gets headaches' }, ['new-neurological-signs: headaches']],
    [
      { anythingElse: 'He gets headaches and drops things' },
      ['new-neurological-signs: headaches', 'other-hand-or-lost-skill: drops things'],
    ],
    [
      { anythingElse: 'Headaches, headaches, and a seizure in the summer' },
      ['new-neurological-signs: Headaches, seizure'],
    ],
    [{ enjoys: 'Numbers', anythingElse: 'Painting and number games' }, []],
    [{}, []],
  ])('%j: %j', (given, expected) => {
    expect(found(given)).toEqual(expected)
  })
})

describe('signs in a comment', () => {
  it('are found as in a history, each word once', () => {
    expect(flagsInComment('Numb fingers. Numb again on Friday; the hand hurts.')).toEqual([
      { id: 'new-neurological-signs', quotes: ['Numb'] },
      { id: 'pain', quotes: ['hurts'] },
    ])
    expect(flagsInComment(null)).toEqual([])
    expect(flagsInComment('')).toEqual([])
  })
})

describe('what of a text may be read while it is typed', () => {
  it.each([
    ['likes numb', 'likes', 'likes '],
    ['likes numbers ', 'likes numb', 'likes numbers '],
    ['is numb.', 'is', 'is numb.'],
    ['is numb', 'is numb', 'is numb'],
    ['is numb', null, 'is '],
    ['is numb', undefined, 'is numb'],
    ['doesn’t', 'd', ''],
    [null, 'is numb', ''],
  ] as const)('%j after %j: %j', (now, before, expected) => {
    expect(readableText(now, before)).toBe(expected)
  })
})
