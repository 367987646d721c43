import { describe, expect, it } from 'vitest'
import { checkLetter, openFindings, type LetterContext } from '../../shared/letterChecks.ts'
import type { LetterDraft, LetterSection, LetterSectionId } from '../../shared/letters.ts'
import { draftProgressLetter } from '../../shared/letterTemplates.ts'

const context: LetterContext = {
  ownNames: ['Mara Example', 'Mara', 'Sam Example', 'Ada Writer'],
  otherNames: ['Ben Sample', 'Ben', 'Idris', 'Sam'],
}

const part = (id: LetterSectionId, text: string, heading = 'Heading'): LetterSection => ({
  id,
  heading,
  text,
})

const good: LetterDraft = {
  salutation: 'Dear Sam Example',
  sections: [
    part('opening', 'I met Mara on 3 Mar 2026.'),
    part('strengths', '- Mara draws maps.\n- Mara helps others.'),
    part('home', '- Write a list together. About 5 minutes.'),
    part('next', 'Our next visit is on 14 Dec 2026.'),
  ],
  nextVisitOn: '2026-12-14',
}

const withSection = (section: LetterSection): LetterDraft => ({
  ...good,
  sections: [...good.sections.filter(({ id }) => id !== section.id), section],
})

const found = (draft: LetterDraft) =>
  checkLetter(draft, context).findings.map(({ level, section, phrase }) => ({ level, section, phrase }))

describe('checkLetter', () => {
  it('finds nothing in a plain letter that leads with strengths', () => {
    expect(found(good)).toEqual([])
  })

  it.each([
    ['a blocked word', part('work', 'She used the wrong hand.'), 'blocked', 'wrong hand'],
    ['a discouraged word', part('work', 'Mara failed to finish.'), 'discouraged', 'failed'],
    ['a blocked word in a heading', part('work', 'Text.', 'A messy page'), 'blocked', 'messy'],
    ['a score without a meaning', part('changes', 'Her T score was 54.4.'), 'blocked', 'T score was 54.4'],
    ['another child’s whole name', part('work', 'Mara sat with Ben Sample.'), 'blocked', 'Ben Sample'],
    ['another child’s first name', part('work', 'Mara sat with Idris.'), 'discouraged', 'Idris'],
    ['a prompt left open', part('work', 'We did [write what].'), 'blocked', '[write what]'],
    ['a bracket never closed', part('work', 'We did [write what'), 'blocked', '[write what'],
  ] as const)('finds %s', (_what, section, level, phrase) => {
    expect(found(withSection(section))).toEqual([{ level, section: section.id, phrase }])
  })

  it('looks at the greeting as well', () => {
    expect(found({ ...good, salutation: 'Dear [name]' })).toEqual([
      { level: 'blocked', section: 'salutation', phrase: '[name]' },
    ])
  })

  it('does not take a carer’s or the author’s name for another child’s', () => {
    expect(found(withSection(part('work', 'Sam wrote to us. Ada helped.')))).toEqual([])
  })

  it('does not judge the words of an open prompt, only that it is open', () => {
    expect(found(withSection(part('home', '[The plan says: messy play, T score 54.]')))).toEqual([
      { level: 'blocked', section: 'home', phrase: '[The plan says: messy play, T score 54.]' },
    ])
  })

  it.each([
    ['', 1],
    ['- Mara draws maps.', 1],
    ['- Mara draws maps.\n- Mara helps others.', 0],
    ['Mara draws maps. She helps others.', 0],
    ['Mara draws maps.', 1],
    ['- Mara draws maps.\n- [one more]', 1],
  ])('asks for two strengths: %j', (text, expected) => {
    const level = found(withSection(part('strengths', text))).filter(
      ({ phrase }) => phrase === 'fewer than two strengths',
    )
    expect(level).toHaveLength(expected)
  })

  it.each([
    [3, []],
    [4, ['4 things to do at home']],
  ])('warns above three things at home: %i', (count, phrases) => {
    const text = Array.from({ length: count }, (_, n) => `- Thing ${n + 1}.`).join('\n')
    expect(found(withSection(part('home', text))).map(({ phrase }) => phrase)).toEqual(phrases)
  })

  it('asks for a reason when no next date is set', () => {
    expect(found({ ...good, nextVisitOn: null })).toEqual([
      { level: 'discouraged', section: 'next', phrase: 'no next date' },
    ])
  })

  it('points out a next date that the text does not name', () => {
    expect(found({ ...good, nextVisitOn: '2026-12-21' })).toEqual([
      { level: 'advice', section: 'next', phrase: null },
    ])
  })

  it('advises on a letter above school grade 8 and shows its longest sentence', () => {
    const sentence =
      'The multidisciplinary evaluation of occupational participation demonstrated considerable improvement ' +
      'notwithstanding environmental limitations encountered throughout the intervention.'
    const { findings, reading } = checkLetter(withSection(part('work', sentence)), context)
    expect(reading.grade).toBeGreaterThan(8)
    expect(reading.longestSentence).toBe(sentence)
    expect(findings).toContainEqual(
      expect.objectContaining({ level: 'advice', section: 'letter', phrase: sentence }),
    )
  })

  it('tells the same finding of one section once', () => {
    expect(found(withSection(part('work', 'The wrong hand. The Wrong hand.')))).toHaveLength(1)
  })
})

describe('openFindings', () => {
  const draft = { ...withSection(part('work', 'She failed. The wrong hand.')), nextVisitOn: null }
  const phrases = (overrides: Parameters<typeof openFindings>[1]) =>
    openFindings(checkLetter(draft, context), overrides).map(({ phrase }) => phrase)

  it('keeps every blocked and every unexplained finding', () => {
    expect(phrases([])).toEqual(['failed', 'wrong hand', 'no next date'])
  })

  it('lets discouraged words pass with a reason, and blocked ones never', () => {
    expect(
      phrases([
        { phrase: 'Failed', reason: 'The child’s own word' },
        { phrase: 'no next date', reason: 'Moving away' },
        { phrase: 'wrong hand', reason: 'A quotation' },
      ]),
    ).toEqual(['wrong hand'])
  })

  it('lets advice pass without a reason', () => {
    expect(openFindings(checkLetter({ ...good, nextVisitOn: '2026-12-21' }, context), [])).toEqual([])
  })
})

describe('the assembled progress letter', () => {
  it('stays within school grade 8 and raises nothing but its open prompts', () => {
    const { salutation, sections } = draftProgressLetter({
      childName: 'Mara',
      addressedTo: [],
      author: 'Ada Writer',
      clinicName: 'Example Clinic',
      clinicPhone: '01632 960 000',
      sessions: [{ heldOn: '2026-03-03', type: 'assessment' }],
      strengths: [
        { text: 'Mara draws maps', source: 'Note' },
        { text: 'Mara helps others', source: 'Note' },
      ],
      childWords: [],
      samples: [
        {
          takenOn: '2026-03-03',
          task: 'copy',
          script: 'print',
          letters: 50,
          legibleLetters: 38,
          lettersPerMinute: 41,
          reversals: 1,
          smudge: 'light',
        },
      ],
      goals: [],
      home: [],
      lastPlan: { heldOn: '2026-03-03', text: 'Poor compliance with messy play' },
      schoolAdvice: [],
      nextVisitOn: '2026-12-14',
    })
    const { findings, reading } = checkLetter({ salutation, sections, nextVisitOn: '2026-12-14' }, context)
    expect(reading.grade).toBeLessThanOrEqual(8)
    expect(findings.map(({ level, section }) => `${level} ${section}`)).toEqual([
      'blocked work',
      'blocked goals',
      'blocked home',
      'blocked school',
    ])
  })
})
