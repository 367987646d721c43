import { describe, expect, it } from 'vitest'
import { adviceGiven } from '../../server/seeds/demo/advice.ts'
import { children } from '../../server/seeds/demo/children.ts'
import { clinicSettings } from '../../server/seeds/demo/clinic.ts'
import type { DemoLetter, DemoLetterText } from '../../server/seeds/demo/demoTypes.ts'
import { goals } from '../../server/seeds/demo/goals.ts'
import { letters } from '../../server/seeds/demo/letters.ts'
import { staff } from '../../server/seeds/demo/people.ts'
import { samples } from '../../server/seeds/demo/samples.ts'
import { sessionNotes } from '../../server/seeds/demo/sessionNotes.ts'
import { adviceItemById } from '../../shared/adviceItems.ts'
import { addDays } from '../../shared/days.ts'
import { lettersPerMinute } from '../../shared/handwriting.ts'
import { checkLetter, openFindings } from '../../shared/letterChecks.ts'
import type { ProgressFacts } from '../../shared/letterFacts.ts'
import type { LetterDraft } from '../../shared/letters.ts'
import { draftProgressLetter } from '../../shared/letterTemplates.ts'

const today = '2026-12-01'
const day = (offset: number) => addDays(today, offset)
const childOf = (number: number) => children.find((child) => child.number === number)!
const nameOf = (key: string) => staff.find((person) => person.key === key)!.displayName

/** What the record held on the evening on which the letter was begun. */
function factsFor({ child: number, author, createdDay, nextVisitDay }: DemoLetter): ProgressFacts {
  const child = childOf(number)
  const until = <T extends { child: number }>(items: readonly T[], when: (item: T) => number) =>
    items.filter((item) => item.child === number && when(item) <= createdDay)
  const notes = until(sessionNotes, ({ signed }) => signed?.day ?? 99)
  return {
    childName: child.preferredName ?? child.givenName,
    addressedTo: [],
    author: nameOf(author),
    clinicName: clinicSettings.clinicName,
    clinicPhone: clinicSettings.clinicPhone,
    sessions: notes.map(({ heldDay, type }) => ({ heldOn: day(heldDay), type })),
    strengths: (child.strengths ?? '').split('\n').map((text) => ({ text, source: 'Record' })),
    childWords: [],
    samples: until(samples, ({ takenDay }) => takenDay)
      .filter(({ removedDay }) => removedDay === null)
      .map(({ takenDay, details }) => ({
        ...details,
        takenOn: day(takenDay),
        lettersPerMinute: lettersPerMinute(details),
      })),
    goals: until(goals, ({ setDay }) => setDay).map(({ details, setDay, ratings }, index) => {
      const latest = ratings.filter((rating) => rating.day <= createdDay).at(-1)
      return {
        activity: details.activity,
        childVoice: details.childVoice,
        setOn: day(setDay),
        baselineText: details.levels[details.baseline + 2]!,
        latest: latest
          ? { level: latest.level, text: details.levels[latest.level + 2]!, ratedOn: day(latest.day) }
          : null,
        sessions: notes.filter((note) => note.goals.includes(index)).length,
      }
    }),
    home: [],
    lastPlan: null,
    schoolAdvice: until(adviceGiven, ({ publishedDay }) => publishedDay)
      .filter(({ endedDay }) => endedDay === null || endedDay > createdDay)
      .flatMap(({ items }) => items)
      .map(({ itemId }) => ({ text: adviceItemById(itemId)!.text, reply: null, source: itemId })),
    nextVisitOn: nextVisitDay === null ? null : day(nextVisitDay),
  }
}

function written(letter: DemoLetter, wording: DemoLetterText): LetterDraft {
  const { salutation, sections } = draftProgressLetter(factsFor(letter))
  return {
    salutation: letter.salutation ?? salutation,
    nextVisitOn: letter.nextVisitDay === null ? null : day(letter.nextVisitDay),
    sections: sections.map((section) => ({
      ...section,
      text: section.id in wording ? (wording[section.id] ?? '') : section.text,
    })),
  }
}

function check(letter: DemoLetter, wording = letter.wording) {
  const child = childOf(letter.child)
  return checkLetter(written(letter, wording), {
    ownNames: [
      child.givenName,
      child.familyName,
      ...child.carers.map(({ name }) => name),
      nameOf(letter.author),
    ],
    otherNames: children
      .filter(({ number }) => number !== child.number)
      .flatMap(({ givenName, familyName }) => [givenName, familyName, `${givenName} ${familyName}`]),
  })
}

describe('the demo letters', () => {
  const approved = letters.filter(({ acts }) => acts.some(({ act }) => act === 'approve'))

  it.each(approved)('letter of child $child: approved with nothing left open', (letter) => {
    const approval = letter.acts.find((act) => act.act === 'approve')!
    expect(openFindings(check(letter), approval.act === 'approve' ? approval.overrides : [])).toEqual([])
  })

  it.each(approved)('letter of child $child: within school grade 8', (letter) => {
    expect(check(letter).reading.grade).toBeLessThanOrEqual(8)
  })

  it('child 26: the first wording is refused, the second is not', () => {
    const letter = letters.find(({ child }) => child === 26)!
    const blocked = check(letter, { ...letter.wording, ...letter.firstWording })
      .findings.filter(({ level }) => level === 'blocked')
      .map(({ phrase }) => phrase)
    expect(blocked).toEqual(['wrong hand', 'messy'])
    expect(openFindings(check(letter), [])).toEqual([])
  })

  it('child 18: the letter just begun still holds its prompts', () => {
    const letter = letters.find(({ child }) => child === 18)!
    expect(check(letter).findings.map(({ level, section }) => `${level} ${section}`)).toContain(
      'blocked home',
    )
  })

  it('child 21: sent back for its four things at home', () => {
    const letter = letters.find(({ child }) => child === 21)!
    expect(check(letter).findings).toContainEqual(
      expect.objectContaining({ level: 'discouraged', section: 'home', phrase: '4 things to do at home' }),
    )
  })

  it('child 23: two letters of the same words, one for each household', () => {
    const [one, other] = letters.filter(({ child }) => child === 23)
    expect(written(one!, one!.wording).sections).toEqual(written(other!, other!.wording).sections)
    const carers = [one!, other!].map(({ acts }) =>
      acts.flatMap((act) => (act.act === 'send' ? act.carers : [])),
    )
    expect(carers).toEqual([[0], [1]])
    const names = childOf(23).carers.map(({ name }) => name)
    expect([one!.salutation, other!.salutation]).toEqual(names.map((name) => `Dear ${name}`))
  })

  it('goes only to carers whose consent for letters was in force', () => {
    for (const { child, acts } of letters) {
      for (const act of acts) {
        if (act.act !== 'send') continue
        for (const carer of act.carers) {
          const consents = childOf(child).consents.filter(
            ({ purpose, carer: giver, givenDay }) =>
              giver === carer && ['email_link', 'email_attachment'].includes(purpose) && givenDay <= act.day,
          )
          expect([child, consents.length > 0]).toEqual([child, true])
        }
      }
    }
  })

  it.each([
    [16, 'cancelled'],
    [37, 'failed'],
    [1, 'opened'],
  ])('child %i: the letter ends %s', (child, outcome) => {
    expect(letters.find((letter) => letter.child === child)!.acts.at(-1)).toMatchObject({
      act: 'send',
      outcome,
    })
  })
})
