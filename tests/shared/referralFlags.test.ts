import { describe, expect, it } from 'vitest'
import { emptyHistory } from '../../shared/histories.ts'
import { urgentWordsFor } from '../../shared/redFlagSources.ts'
import type { ReferralConcern } from '../../shared/referrals.ts'
import { referralFlagsOf } from '../../shared/referralFlags.ts'

// What counts as a warning sign: NICE NG127 (2019) for early preference, fisting and loss of skill; Bhate & Ganesan
// 2015 for new weakness; the rest is common practice, no source. The sentences are our own.
const flags = (reason: string, concerns: ReferralConcern[] = ['handwriting'], birthDate = '2018-03-09') =>
  referralFlagsOf({ reason, concerns, birthDate, receivedOn: '2026-03-03' })
const ids = (...given: Parameters<typeof flags>) => flags(...given).map(({ id }) => id)

describe('warning signs in a referral', () => {
  it.each<[string, string[]]>([
    [
      'New weakness in the left hand with headaches, now writes with the right.',
      ['new-neurological-signs', 'change-of-hand'],
    ],
    ['She has a weakness of the right arm since last week.', ['new-neurological-signs']],
    ['Had a seizure in the summer; since then the letters are smaller.', ['new-neurological-signs']],
    [
      'Uses the left hand only since 8 months, the right is often fisted.',
      ['preference-before-12-months', 'other-hand-or-lost-skill'],
    ],
    ['Always reached with the left hand, from before her first birthday.', ['preference-before-12-months']],
    ['Parents noticed he prefers the left from 14 months.', ['preference-12-to-18-months']],
    ['Parents noticed he prefers the left from 18 months.', []],
    ['He hardly uses his right hand and drops things at lunch.', ['other-hand-or-lost-skill']],
    ['Fractured the left arm in May, in plaster for six weeks.', ['change-of-hand']],
    ['Her hand hurts after ten minutes of writing.', ['pain']],
    ['At her last school she was told to write with the right hand.', ['punished-for-hand']],
    ['Smudges her work and bumps elbows with her neighbour, loves drawing.', []],
    ['Left-handed, writes slowly, would like advice about scissors.', []],
    ['Reverses numbers and paints with either hand.', []],
  ])('in "%s" finds %j', (reason, expected) => {
    expect(ids(reason)).toEqual(expected)
  })

  it.each([
    'No pain when writing, no headaches.',
    'He writes without pain and has never had seizures.',
    'There is not any numbness. She enjoys drawing.',
  ])('finds nothing in "%s", which says that it is not so', (reason) => {
    expect(ids(reason)).toEqual([])
  })

  it.each<[string, string[]]>([
    ['No headaches, seizures or numbness.', []],
    ['No headaches, no seizures, no pain.', []],
    ['She hasn’t had any seizures and doesn’t have headaches.', []],
    ['Seizures: none. Headaches? No.', []],
    ['He never complains of pain.', []],
    ['Nobody has punished or smacked her; no one ever punished him.', []],
    // What a denial does not reach.
    ['No headaches but numbness in the left hand.', ['new-neurological-signs']],
    ['No pain and sudden weakness of the arm.', ['new-neurological-signs']],
    ['No pain, numb since Monday.', ['new-neurological-signs']],
    ['It does not stop hurting.', ['pain']],
    ['Not only headaches, she drops things too.', ['new-neurological-signs', 'other-hand-or-lost-skill']],
    ['We are not sure whether it is numb.', ['new-neurological-signs']],
  ])('reads what is denied in "%s" as %j', (reason, expected) => {
    expect(ids(reason)).toEqual(expected)
  })

  it('does not let a denial in one sentence hide what the next one says', () => {
    expect(ids('No headaches. The hand hurts after a page.')).toEqual(['pain'])
  })

  it('raises pain and pressure when they are ticked and the text is silent, and then quotes no words', () => {
    expect(flags('Please see this child soon.', ['pain_fatigue', 'pressure_to_switch'])).toMatchObject([
      { id: 'pain', words: null },
      { id: 'punished-for-hand', words: null },
    ])
  })

  it.each([
    ['2020-03-03', ['swaps-within-task']],
    ['2020-03-04', []],
  ])(
    'asks for a full assessment of an unsettled hand from the sixth birthday on (born %s)',
    (birthDate, expected) => {
      expect(ids('Uses either hand for drawing.', ['hand_preference_unclear'], birthDate)).toEqual(expected)
    },
  )

  it('says nothing about age while the date is still being typed', () => {
    expect(ids('Uses either hand for drawing.', ['hand_preference_unclear'], '-03-')).toEqual([])
  })

  it('names the emergency number in the words that the family reads', () => {
    const [sign] = flags('Sudden weakness of the left hand.')
    const [family = ''] = urgentWordsFor({ ...emptyHistory, newWeakness: 'yes' })
    for (const words of [sign?.text, family])
      expect(words).toMatch(/it came suddenly or is getting worse.*even (?:if it came )?after a fall/i)
  })

  it('quotes the words that raised a sign and marks new weakness as the most pressing', () => {
    const [first] = flags('There is sudden left-sided weakness since Monday.')
    expect(first).toMatchObject({ id: 'new-neurological-signs', level: 'overdue' })
    expect(first!.words).toContain('weakness')
    expect(first!.text).toMatch(/emergency/)
  })

  it('never advises changing a hand and never names a diagnosis', () => {
    const all = flags(
      'New weakness in one hand, since 8 months, hardly uses the right, broke his arm, it hurts, punished, either hand',
      ['hand_preference_unclear', 'pain_fatigue', 'pressure_to_switch'],
    )
    expect(all.length).toBeGreaterThanOrEqual(6)
    for (const { text } of all) {
      expect(text).not.toMatch(/switch (?:to|the)|use the right|palsy|stroke|disorder|diagnos/i)
    }
  })
})
