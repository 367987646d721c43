import { describe, expect, it } from 'vitest'
import { birthDateFor } from '../../server/seeds/demo/demoDays.ts'
import { children } from '../../server/seeds/demo/children.ts'
import { stateOf } from '../../server/seeds/demo/childParts.ts'
import { goals } from '../../server/seeds/demo/goals.ts'
import { parents } from '../../server/seeds/demo/parents.ts'
import { staff, teachers } from '../../server/seeds/demo/people.ts'
import { questionnaires } from '../../server/seeds/demo/questionnaires.ts'
import { samples } from '../../server/seeds/demo/samples.ts'
import { schools } from '../../server/seeds/demo/schools.ts'
import { weakness } from '../../server/services/passwords.ts'
import { addDays, chronologicalAge, weeksBetween } from '../../shared/days.ts'
import { isOneMailbox } from '../../shared/fields.ts'
import { attainmentTScore, goalWeight } from '../../shared/goalAttainment.ts'
import { scoreHandUse, type HandUseAnswer } from '../../shared/handUse.ts'
import { lettersPerMinute } from '../../shared/handwriting.ts'
import { passwordLength } from '../../shared/passwordRules.ts'

const today = '2026-12-01'

/*
 * Source of every number in this table: the clinic's demo scenario. Columns: child, age at the demo day, class,
 * therapist, where the episode stands, days since the referral, answers and quotient of the hand-use form.
 */
const scenario = `
01 Mateo Quispe-Arnold 8;7 Heron AN active 150 SL6,L3,E1 -88.2
02 Anouk Verhaeghen 8;11 Heron AN active 120 SL7,L2,R1 -88.2
03 Idris Bello-Marsh 8;5 Heron RV active 131 SL5,L4,E1 -87.5
04 Soraya Haidari 8;2 Otter MC active 160 SL4,L4,E2 -75.0
05 Tane Whetuira 8;4 Otter TZ review 290 SL6,L2,E2 -77.8
06 Poppy Ellacott 8;9 Otter AN discharged 330 SL8,L2 -100.0
07 Noor Al-Rashwan 4;2 Robin - waiting 22 - -
08 Bertie Coombes-Hale 4;6 Robin TZ redirected 40 SL9,N1 -100.0
09 Ayumi Torigoe 4;11 Robin - waiting 35 L3,E2,R1,N4 -25.0
10 Kofi Adjarey 5;1 Robin RV assessing 75 L2,E5,R3 6.7
11 Freya Lindqvist-Shaw 5;6 Wren MC assessing 90 SL6,L4 -100.0
12 Axel Lindqvist-Shaw 5;6 Wren MC assessing 90 R4,SR4,E2 75.0
13 Amara Diallo-Finn 5;9 Wren AN active 110 SL5,L3,R2 -73.3
14 Jakub Sroka 5;3 Wren - waiting 61 - -
15 Priya Raghunath 6;2 Wren TZ active 140 SL2,L3,E2,R2,SR1 -20.0
16 Callum Strathearn 6;8 Finch RV consent_withdrawn 155 SL6,L3,R1 -87.5
17 Mei-Lin Tsao 6;5 Finch MC active 100 SL8,E2 -80.0
18 Oluwaseun Bright 6;10 Finch AN active 98 SL4,L5,E1 -86.7
19 Gethin Prosser-Lee 6;0 Wren - waiting 18 - -
20 Zofia Halbersztadt 6;11 Finch TZ discharged 210 L4,E3,R3 -7.7
21 Rafael Montoya-Birch 7;0 Otter RV active 125 SL7,L1,E2 -78.9
22 Leilani Kapaona 7;3 Otter MC review 200 SL5,L5 -100.0
23 Hamza Siddiq-Rowe 7;6 Otter AN active 135 SL6,L2,R2 -75.0
24 Ottilie Brandreth 7;9 Otter TZ active 145 SL3,L6,E1 -85.7
25 Dilan Yavaş 7;11 Otter - waiting 137 - -
26 Esther Makori-Lund 9;1 Badger RV active 118 SL6,L4 -100.0
27 Finlay Garroway 9;4 Badger AN review 240 SL2,L2,E1,R3,SR2 6.7
28 Inés Salvatierra 9;7 Badger MC discharged 390 SL5,L2,E3 -66.7
29 Viktor Danailov 9;10 Badger TZ active 165 SL7,L3 -100.0
30 Tui Parangi 10;0 Badger - waiting 30 - -
31 Alina Grigorescu 10;3 Badger AN assessing 70 E10 0.0
32 Samuel Oyelaran-Kent 10;6 Badger RV assessing 66 SL4,L3,E2,R1 -62.5
33 Beatrix Holloway-Nunn 10;9 Badger TZ review 410 SL10 -100.0
34 Youssef Benkirat 11;2 7A MC active 128 SL6,L3,E1 -88.2
35 Harriet Lockyer-Bui 11;5 7A AN assessing 58 SL5,L3,R2 -73.3
36 Nikau Edgecombe 11;9 7A TZ discharged 300 SL7,L2,E1 -88.9
37 Saoirse Tierney-Vale 12;1 8C RV active 112 SL8,L1,E1 -89.5
38 Emre Kocabaş 12;6 8C MC review 260 SL4,L2,E2,R2 -50.0
39 Thandeka Moloi-Price 13;4 9B AN assessing 27 SL3,L2,R3,SR2 -6.7
40 Conrad Aspinall-Reyes 14;3 9B TZ discharged 450 SL9,L1 -100.0`

const rows = scenario
  .trim()
  .split('\n')
  .map((line) => {
    const [number, given, family, age, className, therapist, state, referred, answers, quotient] =
      line.split(' ')
    return {
      number: Number(number),
      name: `${given} ${family}`,
      age,
      className,
      therapist,
      state,
      referred,
      answers,
      quotient,
    }
  })
const initials = { AN: 'adaeze', TZ: 'tomasz', MC: 'mairi', RV: 'rohan', '-': null } as const
const childOf = (number: number) => children.find((child) => child.number === number)!
const lastForm = (number: number) => questionnaires.findLast((form) => form.child === number)
const codes: Record<HandUseAnswer, string> = {
  strong_left: 'SL',
  left: 'L',
  either: 'E',
  right: 'R',
  strong_right: 'SR',
  does_not_do: 'N',
}

/** How often each answer was given; an unanswered item counts with "does not do", as in the scenario. */
function countAnswers(answers: Record<string, HandUseAnswer | null>) {
  const counts: Record<string, number> = {}
  for (const answer of Object.values(answers)) {
    const code = answer === null ? 'N' : codes[answer]
    counts[code] = (counts[code] ?? 0) + 1
  }
  return counts
}

describe('the demo children', () => {
  it('are the forty of the scenario, in its order', () => {
    expect(
      children.map(({ number, givenName, familyName }) => `${number} ${givenName} ${familyName}`),
    ).toEqual(rows.map(({ number, name }) => `${number} ${name}`))
  })

  it.each(rows)('$number $name: age, class, therapist, state and days since referral', (row) => {
    const child = childOf(row.number)
    const { years, months } = chronologicalAge(birthDateFor(today, child.age, child.ageDays), today)
    expect(`${years};${months}`).toBe(row.age)
    const className = schools
      .flatMap(({ classes }) => classes)
      .find(({ key }) => key === child.classKey)?.name
    expect(className).toBe(row.className)
    expect(child.therapist).toBe(initials[row.therapist as keyof typeof initials])
    expect(stateOf(child)).toBe(row.state)
    expect(-child.referral.receivedDay).toBe(Number(row.referred))
  })

  it.each(rows.filter(({ answers }) => answers !== '-'))('$number $name: $answers give $quotient', (row) => {
    const form = lastForm(row.number)!
    const expected = Object.fromEntries(
      row.answers!.split(',').map((part) => [part.replace(/\d+/, ''), Number(part.replace(/\D+/, ''))]),
    )
    expect(countAnswers(form.answers)).toEqual(expected)
    expect(scoreHandUse(form.answers).quotient?.toFixed(1)).toBe(row.quotient)
  })

  it.each(rows.filter(({ answers }) => answers === '-'))('$number $name: no form yet', ({ number }) => {
    expect(lastForm(number)).toBeUndefined()
  })

  it('has one provisional form, saved and not locked', () => {
    const provisional = questionnaires.filter((form) => scoreHandUse(form.answers).standing !== 'scorable')
    expect(provisional.map(({ child, locked }) => [child, locked])).toEqual([[9, false]])
  })

  it('has parent and teacher differing on four activities for child 20', () => {
    const [teacher, parent] = questionnaires.filter(({ child }) => child === 20)
    const side = (answer: HandUseAnswer | null | undefined) => (answer ?? '').replace('strong_', '')
    const differing = Object.keys(parent!.answers).filter(
      (item) => side(parent!.answers[item]) !== side(teacher!.answers[item]),
    )
    expect(differing).toHaveLength(4)
  })

  it('adds up to the scenario’s totals by state and therapist', () => {
    const tally = (values: (string | null)[]) =>
      Object.fromEntries(
        [...new Set(values)].map((value) => [value, values.filter((other) => other === value).length]),
      )
    expect(tally(children.map(stateOf))).toEqual({
      active: 15,
      assessing: 7,
      waiting: 6,
      review: 5,
      discharged: 5,
      redirected: 1,
      consent_withdrawn: 1,
    })
    expect(tally(children.map(({ therapist }) => therapist))).toEqual({
      adaeze: 10,
      tomasz: 9,
      mairi: 8,
      rohan: 7,
      null: 6,
    })
  })

  it('keeps the ages on any demo day, leap days and ends of months included', () => {
    for (let shift = 0; shift < 1500; shift += 1) {
      const day = addDays('2026-12-01', shift)
      for (const { age, ageDays } of children.slice(0, 12)) {
        const { years, months } = chronologicalAge(birthDateFor(day, age, ageDays), day)
        expect({ day, years, months }).toEqual({ day, ...age })
      }
    }
  })
})

describe('the demo goals and samples', () => {
  it.each([
    [1, '34.6', '54.4'],
    [6, '31.7', '59.1'],
  ])('child %i: T from %s to %s', (child, first, last) => {
    const weighed = goals
      .filter((goal) => goal.child === child)
      .map(({ details, ratings }) => ({
        weight: goalWeight(details.importance, details.difficulty),
        baseline: details.baseline,
        latest: ratings.at(-1)!.level,
      }))
    const score = (of: 'baseline' | 'latest') =>
      attainmentTScore(weighed.map((goal) => ({ weight: goal.weight, level: goal[of] })))?.toFixed(1)
    expect(weighed).toHaveLength(3)
    expect([score('baseline'), score('latest')]).toEqual([first, last])
  })

  it('child 28: one goal ends at −1', () => {
    const ends = goals.filter(({ child }) => child === 28).map(({ ratings }) => ratings.at(-1)?.level)
    expect(ends.filter((level) => level === -1)).toHaveLength(1)
  })

  it('child 1: four samples, from 41 to 58 letters a minute', () => {
    const speeds = samples.filter(({ child }) => child === 1).map(({ details }) => lettersPerMinute(details))
    expect(speeds).toHaveLength(4)
    expect([speeds[0], speeds.at(-1)]).toEqual([41, 58])
  })

  it('child 2: 96 of 100 letters can be read', () => {
    const [sample] = samples.filter(({ child }) => child === 2)
    expect((100 * sample!.details.legibleLetters!) / sample!.details.letters!).toBe(96)
  })

  it('child 17: turned letters 9, 3 and 1', () => {
    expect(samples.filter(({ child }) => child === 17).map(({ details }) => details.reversals)).toEqual([
      9, 3, 1,
    ])
  })
})

describe('the demo’s dates of note', () => {
  it.each([
    [5, -35],
    [33, -10],
    [22, 5],
  ])('child %i: review due on day %i', (child, day) => {
    expect(childOf(child).nextReviewDay).toBe(day)
  })

  it('has no other review overdue', () => {
    const overdue = children.filter(({ nextReviewDay }) => nextReviewDay !== null && nextReviewDay < 0)
    expect(overdue.map(({ number }) => number)).toEqual([5, 33])
  })

  it('child 25 has waited 19.6 weeks, the only one over 18', () => {
    const weeks = (number: number) =>
      weeksBetween(addDays(today, childOf(number).referral.receivedDay), today)
    expect(weeks(25).toFixed(1)).toBe('19.6')
    const waiting = children.filter((child) => stateOf(child) === 'waiting').map(({ number }) => number)
    expect(waiting.filter((number) => weeks(number) > 18)).toEqual([25])
  })
})

describe('the demo accounts', () => {
  const people = [...staff, ...teachers, ...parents]

  it('have one mailbox each, at addresses nobody can own', () => {
    expect(people.filter(({ email }) => !isOneMailbox(email) || !email.endsWith('.example'))).toEqual([])
    expect(new Set(people.map(({ email }) => email)).size).toBe(people.length)
  })

  it('have passwords of their own that are long, not easy to guess, and plainly for a demo', () => {
    expect(new Set(people.map(({ password }) => password)).size).toBe(people.length)
    for (const { password, displayName, email } of people) {
      expect(passwordLength(password)).toBeGreaterThanOrEqual(15)
      expect(password).toMatch(/^[a-z]+-[a-z]+-[a-z]+-demo$/)
      expect(weakness(password, [displayName, email])).toBeNull()
    }
  })

  it('belong to the scenario’s people', () => {
    expect(staff.map(({ displayName, wte }) => [displayName, wte])).toEqual([
      ['Ines Valderrama', 1],
      ['Adaeze Nwosu-Reid', 1],
      ['Tomasz Zielak', 1],
      ['Mairi Carnathy', 0.6],
      ['Rohan Venkadesh', 0.8],
      ['Pauline Osterby', 1],
    ])
    expect(staff.filter(({ newlyQualified }) => newlyQualified).map(({ key }) => key)).toEqual(['rohan'])
    expect(teachers.map(({ displayName }) => displayName)).toEqual([
      'Siobhán Delahunt',
      'Kwabena Asirifi',
      'Hye-jin Noh',
    ])
  })

  it('are all used by a carer, and a carer with an account has its address', () => {
    const used = children.flatMap(({ carers }) => carers).filter(({ account }) => account !== null)
    expect(new Set(used.map(({ account }) => account))).toEqual(new Set(parents.map(({ key }) => key)))
    for (const { account, email } of used)
      expect(email).toBe(parents.find(({ key }) => key === account)?.email)
  })
})
