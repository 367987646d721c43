import { describe, expect, it } from 'vitest'
import type { ProgressFacts, SampleFacts } from '../../shared/letterFacts.ts'
import { comparableSamples, sampleChanges } from '../../shared/letterMeasures.ts'
import { draftProgressLetter, maximumHomeItems } from '../../shared/letterTemplates.ts'
import { letterSectionIds } from '../../shared/letters.ts'

const sample = (changes: Partial<SampleFacts>): SampleFacts => ({
  takenOn: '2026-03-03',
  task: 'copy',
  script: 'print',
  letters: 50,
  legibleLetters: 38,
  lettersPerMinute: null,
  reversals: null,
  smudge: null,
  ...changes,
})

const nothing: ProgressFacts = {
  childName: 'Robin',
  addressedTo: [],
  author: 'Ada Example',
  clinicName: 'Example Clinic',
  clinicPhone: null,
  sessions: [],
  strengths: [],
  childWords: [],
  samples: [],
  goals: [],
  home: [],
  lastPlan: null,
  schoolAdvice: [],
  nextVisitOn: null,
}

const goal: ProgressFacts['goals'][number] = {
  activity: 'Writing a full page in class',
  childVoice: 'I want to finish with my friends',
  setOn: '2026-02-01',
  baselineText: 'Writes three lines and stops',
  latest: { level: 1, text: 'Writes a page and a half', ratedOn: '2026-06-02' },
  sessions: 4,
}

const full: ProgressFacts = {
  ...nothing,
  addressedTo: ['Sam Example', 'Kim Example'],
  clinicPhone: '01632 960 000',
  sessions: [
    { heldOn: '2026-03-17', type: 'session' },
    { heldOn: '2026-03-03', type: 'assessment' },
    { heldOn: '2026-03-10', type: 'session' },
  ],
  strengths: [
    { text: 'Robin draws detailed maps', source: 'Session note of 3 Mar 2026' },
    { text: 'Robin helps others in class.', source: 'Session note of 10 Mar 2026' },
  ],
  childWords: [{ text: 'My pen goes fast now', source: 'Session note of 17 Mar 2026' }],
  samples: [
    sample({ takenOn: '2026-03-03' }),
    sample({ takenOn: '2026-06-02', legibleLetters: 46, lettersPerMinute: 58.2 }),
  ],
  goals: [goal],
  home: [
    { text: 'Write a shopping list together', minutes: 5, source: 'Advice of 17 Mar 2026' },
    { text: 'Turn the page a little', minutes: null, source: 'Advice of 17 Mar 2026' },
    { text: 'Third thing', minutes: 10, source: 'Advice of 17 Mar 2026' },
    { text: 'Fourth thing', minutes: 10, source: 'Advice of 17 Mar 2026' },
  ],
  schoolAdvice: [
    { text: 'Give Robin the left seat of a shared desk', reply: 'trying', source: 'Advice W01' },
  ],
  nextVisitOn: '2026-07-14',
}

const section = (facts: ProgressFacts, id: string) => {
  const found = draftProgressLetter(facts).sections.find((candidate) => candidate.id === id)
  if (!found) throw new Error(`No section ${id}`)
  return found.text
}

describe('draftProgressLetter', () => {
  it('keeps the section order of the contract, strengths before work and change', () => {
    expect(draftProgressLetter(full).sections.map((part) => part.id)).toEqual([...letterSectionIds])
  })

  it('leaves no gap when the record answers every section', () => {
    const { salutation, sections } = draftProgressLetter(full)
    expect(salutation).toBe('Dear Sam Example and Kim Example')
    expect(sections.filter((part) => /[[\]]/.test(part.text))).toEqual([])
  })

  it.each(['opening', 'strengths', 'work', 'changes', 'goals', 'home', 'school', 'next'])(
    'holds a prompt in square brackets in %s when the record has nothing for it',
    (id) => {
      expect(section(nothing, id)).toMatch(/\[[^[\]]+\]/)
    },
  )

  it('names nobody in the greeting when the letter goes to two households', () => {
    expect(draftProgressLetter({ ...full, addressedTo: [] }).salutation).toBe('Dear family of Robin')
  })

  it('counts sessions by kind, whatever their order', () => {
    expect(section(full, 'opening')).toContain(
      '- 1 assessment, on 3 Mar 2026\n- 2 therapy sessions, from 10 Mar 2026 to 17 Mar 2026',
    )
  })

  it('prints at most three things to do at home', () => {
    const lines = section(full, 'home').split('\n')
    expect(lines).toHaveLength(maximumHomeItems)
    expect(lines[0]).toBe('- Write a shopping list together. About 5 minutes.')
    expect(lines[1]).toBe('- Turn the page a little.')
  })

  it('offers the last plan inside a gap, so that it is not sent as it stands', () => {
    const facts = {
      ...full,
      home: [],
      lastPlan: { heldOn: '2026-03-17', text: 'Trial [sloped] board.\nReview.' },
    }
    expect(section(facts, 'home')).toBe(
      '[Write up to three things to practise at home, with the minutes for each. ' +
        'The plan of 17 Mar 2026 says: Trial (sloped) board. Review.]',
    )
  })

  it.each([
    [-2, 'This is where we began.'],
    [-1, 'This is on the way to what we hoped for.'],
    [0, 'This is what we hoped for.'],
    [1, 'This is a little more than we hoped for.'],
    [2, 'This is much more than we hoped for.'],
  ])('says goal level %i in words', (level, words) => {
    const text = section({ ...full, goals: [{ ...goal, latest: { ...goal.latest!, level } }] }, 'goals')
    expect(text).toContain(`Writes a page and a half. ${words}`)
    expect(text).not.toMatch(/[-−+]\d/)
  })

  it('says that a goal was not looked at again instead of showing a level', () => {
    expect(section({ ...full, goals: [{ ...goal, latest: null }] }, 'goals')).toContain(
      'not looked at this again yet',
    )
  })

  it('lists as work only the goals that session notes touch', () => {
    expect(
      section({ ...full, goals: [goal, { ...goal, activity: 'Tying laces', sessions: 0 }] }, 'work'),
    ).not.toContain('Tying laces')
  })

  it('gives every fact its section and source', () => {
    const { facts } = draftProgressLetter(full)
    expect(facts.filter((fact) => fact.source.trim() === '')).toEqual([])
    expect(facts).toContainEqual({
      section: 'strengths',
      text: 'Robin draws detailed maps',
      source: 'Session note of 3 Mar 2026',
    })
    expect(facts.filter((fact) => fact.section === 'home')).toHaveLength(maximumHomeItems)
  })

  it.each([
    ['done', 'The teacher says this is done.'],
    ['trying', 'The teacher is trying this.'],
    ['cannot', 'This is not possible there just now'],
  ] as const)('tells the family what the teacher answered: %s', (reply, words) => {
    expect(
      section({ ...full, schoolAdvice: [{ text: 'Do this', reply, source: 'Advice' }] }, 'school'),
    ).toContain(words)
  })
})

describe('comparableSamples', () => {
  it.each([
    ['nothing', [], null, null],
    ['one sample', [sample({ takenOn: '2026-03-03' })], null, '2026-03-03'],
    [
      'the first and the last of the same task',
      [
        sample({ takenOn: '2026-06-02' }),
        sample({ takenOn: '2026-03-03' }),
        sample({ takenOn: '2026-04-01' }),
      ],
      '2026-03-03',
      '2026-06-02',
    ],
    [
      'a repeated task rather than a newer single one',
      [
        sample({ takenOn: '2026-03-03' }),
        sample({ takenOn: '2026-04-01' }),
        sample({ takenOn: '2026-06-02', task: 'free' }),
      ],
      '2026-03-03',
      '2026-04-01',
    ],
    [
      'no pair across scripts',
      [
        sample({ takenOn: '2026-03-03', script: 'print' }),
        sample({ takenOn: '2026-04-01', script: 'right_to_left' }),
      ],
      null,
      '2026-04-01',
    ],
    [
      'only samples with a count',
      [
        sample({ takenOn: '2026-03-03', letters: null, legibleLetters: null }),
        sample({ takenOn: '2026-04-01' }),
      ],
      null,
      '2026-04-01',
    ],
  ] as const)('takes %s', (_what, samples, first, latest) => {
    const found = comparableSamples([...samples] as SampleFacts[])
    expect(found.first?.takenOn ?? null).toBe(first)
    expect(found.latest?.takenOn ?? null).toBe(latest)
  })
})

describe('sampleChanges', () => {
  const lines = (...samples: SampleFacts[]) => sampleChanges('Robin', samples)?.lines.map((line) => line.text)
  const later = { takenOn: '2026-06-02' }

  it('explains readable letters as a count of letters', () => {
    expect(lines(sample({}), sample({ ...later, legibleLetters: 46 }))).toEqual([
      'Of 50 letters, 46 were easy to read. On 3 Mar 2026 it was 38.',
    ])
  })

  it('gives both totals when they differ', () => {
    expect(lines(sample({ letters: 47 }), sample({ ...later, legibleLetters: 46 }))).toEqual([
      'Of 50 letters, 46 were easy to read. On 3 Mar 2026 it was 38 of 47.',
    ])
  })

  it('says a lower count as plainly as a higher one', () => {
    expect(lines(sample({ legibleLetters: 46 }), sample({ ...later, legibleLetters: 38 }))).toEqual([
      'Of 50 letters, 38 were easy to read. On 3 Mar 2026 it was 46.',
    ])
  })

  it('gives speed in letters a minute, in whole letters', () => {
    const speeds = { letters: null, legibleLetters: null }
    expect(
      lines(
        sample({ ...speeds, lettersPerMinute: 41.4 }),
        sample({ ...speeds, ...later, lettersPerMinute: 57.8 }),
      ),
    ).toEqual(['In one minute, Robin wrote 58 letters. On 3 Mar 2026 it was 41.'])
  })

  it.each([
    [9, 1, ['1 letter was turned round. On 3 Mar 2026 it was 9.']],
    [3, 0, ['No letters were turned round. On 3 Mar 2026 it was 3.']],
    [null, 2, ['2 letters were turned round.']],
  ])('counts turned letters from %s to %s', (before, after, expected) => {
    const counts = { letters: null, legibleLetters: null, lettersPerMinute: null }
    expect(
      lines(sample({ ...counts, reversals: before }), sample({ ...counts, ...later, reversals: after })),
    ).toEqual(expected)
  })

  it('leaves turned letters out where none was ever seen', () => {
    expect(lines(sample({ reversals: 0 }), sample({ ...later, reversals: 0 }))).toHaveLength(1)
  })

  it('is null, not a zero, when nothing was counted', () => {
    expect(sampleChanges('Robin', [sample({ letters: null, legibleLetters: null })])).toBeNull()
    expect(sampleChanges('Robin', [])).toBeNull()
  })
})
