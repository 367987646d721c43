import { describe, expect, it } from 'vitest'
import {
  conclusionFindings,
  missingForSigning,
  preferredHand,
  signingProblems,
} from '../../shared/conclusionChecks.ts'
import { evidenceWords, type EvidenceRow } from '../../shared/conclusionEvidence.ts'
import {
  conclusionContentSchema,
  conclusionPlanLabels,
  conclusionPlans,
  confidenceLabels,
  emptyConclusion,
  handPreferenceLabels,
  handPreferences,
  signConclusionSchema,
  type ConclusionContent,
  type HandPreference,
} from '../../shared/conclusions.ts'
import type { FormScore } from '../../shared/forms.ts'
import { defaultCutOffSet } from '../../shared/handUse.ts'
import type { MeasureScore } from '../../shared/measures.ts'
import { checkWording } from '../../shared/wording.ts'

// The rules here are the clinic's own (domain: formulation; words to avoid in letters). None is a published threshold.

const link = { kind: 'measure' as const, id: '00000000-0000-4000-8000-000000000001' }
const full: ConclusionContent = {
  handPreference: 'left_settled',
  confidence: 'high',
  evidence: [link],
  strengths: 'Draws maps.',
  mattersToChild: 'The comic.',
  reasoning: 'Asked and seen, the left hand is chosen.',
  plan: 'advice',
  planDetail: null,
  aboutDisagreements: null,
}

describe('missingForSigning', () => {
  it('finds nothing missing in a full conclusion', () => {
    expect(missingForSigning(full)).toEqual({})
  })

  it('names every part of an empty one', () => {
    expect(Object.keys(missingForSigning(emptyConclusion))).toEqual([
      'handPreference',
      'confidence',
      'evidence',
      'strengths',
      'mattersToChild',
      'reasoning',
      'plan',
    ])
  })

  it.each([
    ['handPreference', { handPreference: null }],
    ['confidence', { confidence: null }],
    ['evidence', { evidence: [] }],
    ['strengths', { strengths: null }],
    ['strengths', { strengths: ' \n\t' }],
    ['mattersToChild', { mattersToChild: '' }],
    ['reasoning', { reasoning: null }],
    ['plan', { plan: null }],
    ['planDetail', { plan: 'medical_review' as const }],
  ] as [string, Partial<ConclusionContent>][])('asks for %s when given %o', (field, given) => {
    expect(Object.keys(missingForSigning({ ...full, ...given }))).toEqual([field])
  })

  it('asks for a word on the disagreements only while there are some', () => {
    expect(missingForSigning(full, ['Two measures differ.'])).toHaveProperty('aboutDisagreements')
    const said = { ...full, aboutDisagreements: 'Pegs were new.' }
    expect(missingForSigning(said, ['Two measures differ.'])).toEqual({})
    expect(missingForSigning(full, [])).toEqual({})
  })
})

describe('preferredHand', () => {
  it.each([
    ['left_settled', 'left'],
    ['left_emerging', 'left'],
    ['right_settled', 'right'],
    ['right_emerging', 'right'],
    ['mixed_steady_by_task', null],
    ['swaps_within_task', null],
    ['possibly_switched', null],
    ['unclear', null],
    [null, null],
  ] as [HandPreference | null, string | null][])('is, for %s, %s', (preference, hand) => {
    expect(preferredHand(preference)).toBe(hand)
  })
})

describe('conclusionFindings', () => {
  it.each([
    ['planDetail', 'Switch him to the right hand.'],
    ['planDetail', 'Retrain the left hand.'],
    ['planDetail', 'Encourage her to write with her right hand.'],
    ['planDetail', 'Use the right hand for writing at school.'],
    ['reasoning', 'She should become right-handed.'],
    ['reasoning', 'He uses the wrong hand.'],
    ['strengths', 'Less clumsy than before.'],
    ['mattersToChild', 'Not to be called a lefty.'],
    ['aboutDisagreements', 'Abnormal dominance explains it.'],
  ] as const)('blocks in %s: %s', (field, text) => {
    const findings = conclusionFindings({ ...full, [field]: text })
    expect(findings.map(({ level }) => level)).toContain('blocked')
    expect(findings.every((finding) => finding.field === field)).toBe(true)
    expect(Object.keys(signingProblems({ ...full, [field]: text }, []))).toEqual([field])
  })

  it.each([
    ['reasoning', 'At five she was asked to switch to the right hand, and went back to the left by herself.'],
    ['planDetail', 'We do not advise a change of hand: nobody should switch her to the right hand.'],
    ['planDetail', 'School does not ask him to write with his right hand.'],
    ['planDetail', 'The right hand steadies the page.'],
    ['reasoning', 'Draws with the right hand at the easel.'],
    ['strengths', 'Plays the right-hand part by ear.'],
  ] as const)('lets stand in %s: %s', (field, text) => {
    expect(conclusionFindings({ ...full, [field]: text })).toEqual([])
    expect(signingProblems({ ...full, [field]: text }, [])).toEqual({})
  })

  it('lets a plan name the hand the child prefers, and blocks the other one', () => {
    const planDetail = 'Write with the left hand, page turned.'
    expect(conclusionFindings({ ...full, planDetail })).toEqual([])
    expect(conclusionFindings({ ...full, handPreference: 'right_settled', planDetail })).toHaveLength(1)
    expect(conclusionFindings({ ...full, handPreference: 'unclear', planDetail })).toEqual([])
  })

  it('points out discouraged words with better ones and does not stop the signature', () => {
    const content = { ...full, reasoning: 'He is still left-handed.' }
    const [finding] = conclusionFindings(content)
    expect(finding).toMatchObject({ field: 'reasoning', level: 'discouraged' })
    expect(finding?.instead.length).toBeGreaterThan(0)
    expect(signingProblems(content, [])).toEqual({})
  })

  it('tells a missing part before a word in the same field', () => {
    const content = { ...full, plan: 'medical_review' as const, planDetail: ' ' }
    expect(signingProblems(content, []).planDetail).toContain('doctor')
  })
})

describe('labels', () => {
  it('have plain words of their own for every choice, none of which the letter checker objects to', () => {
    expect(Object.keys(handPreferenceLabels)).toEqual([...handPreferences])
    expect(Object.keys(conclusionPlanLabels)).toEqual([...conclusionPlans])
    const words = [
      ...Object.values(handPreferenceLabels),
      ...Object.values(conclusionPlanLabels),
      ...Object.values(confidenceLabels),
    ]
    expect(new Set(words).size).toBe(words.length)
    for (const text of words) expect(checkWording(text), text).toEqual([])
  })
})

describe('conclusionContentSchema', () => {
  const problem = async (given: object) =>
    conclusionContentSchema.validate({ ...emptyConclusion, ...given }, { strict: true }).then(
      () => null,
      (error: Error) => error.message,
    )

  it('takes an empty draft and a full one, and tidies texts', async () => {
    expect(await problem({})).toBeNull()
    expect(await problem(full)).toBeNull()
    expect(conclusionContentSchema.cast({ ...full, strengths: '  Draws\r\nmaps  ' }).strengths).toBe(
      'Draws\nmaps',
    )
    expect(conclusionContentSchema.cast({ ...full, strengths: '' }).strengths).toBeNull()
  })

  it.each([
    ['a preference not on the list', { handPreference: 'ambidextrous' }],
    ['a number as text', { reasoning: 5 }],
    ['a NUL character', { reasoning: 'a\u0000b' }],
    ['half a character', { reasoning: 'a\ud83d' }],
    ['a text beyond its length', { reasoning: 'x'.repeat(8001) }],
    ['41 links', { evidence: Array(41).fill(link) }],
    ['a link with more to it', { evidence: [{ ...link, words: 'smuggled' }] }],
    ['an unknown field', { diagnosis: 'DCD' }],
    ['a missing list of evidence', { evidence: undefined }],
  ])('refuses %s', async (_what, given) => {
    expect(await problem(given)).not.toBeNull()
  })

  it('counts characters, not units of storage', async () => {
    expect(await problem({ reasoning: '🌟'.repeat(8000) })).toBeNull()
  })
})

describe('signConclusionSchema', () => {
  it.each([[{}], [{ confirmed: false }], [{ confirmed: null }], [{ confirmed: 1 }]])(
    'refuses %o',
    async (given) => {
      await expect(signConclusionSchema.validate(given, { strict: true })).rejects.toThrow(/Confirm|type/)
    },
  )
})

const row = (given: Partial<EvidenceRow>): EvidenceRow => ({
  kind: 'measure',
  id: link.id,
  on: '2026-03-03',
  what: null,
  informant: null,
  score: null,
  superseded: false,
  ...given,
})
const formScore = (given: Partial<FormScore>): FormScore => ({
  formVersion: 'hand-use-10.v1',
  method: 'edinburgh_style',
  right: 1,
  left: 16,
  total: null,
  answered: 10,
  doesNotDo: 0,
  unanswered: 0,
  // 6 strong left, 3 left, 1 either: computed in the clinic's brief.
  quotient: (100 * (1 - 16)) / 17,
  strength: null,
  standing: 'scorable',
  direction: 'left',
  cutOffs: defaultCutOffSet,
  ...given,
})
const reaching: MeasureScore = {
  kind: 'reaching',
  left: 14,
  right: 7,
  lost: 0,
  swapped: 0,
  index: -100 / 3,
  chance: null,
  pTwoSided: null,
  preferred: 'left',
  crossing: null,
  nearSide: null,
  midline: null,
  places: [],
}
const hand = (mean: number | null) => ({ trials: 3, mean, sd: null, interval: null })
const seating: MeasureScore = {
  kind: 'seating',
  marks: null,
  marksFrom: null,
  seatRange: null,
  depthRange: null,
  deskRange: null,
  seatChange: null,
  depthChange: null,
  deskChange: null,
}
const side = (found: 'left' | 'right' | 'mixed' | null) => ({ sum: 0, answered: 4, side: found, index: 0 })

describe('evidenceWords', () => {
  it.each([
    [
      { kind: 'questionnaire', what: 'Ten activities', informant: 'guardian', score: formScore({}) },
      'Ten activities, Parent or carer, 3 Mar 2026: −88.2, 10 activities answered',
    ],
    [
      {
        kind: 'questionnaire',
        what: 'Ten activities',
        informant: 'teacher',
        score: formScore({ quotient: null, answered: 1 }),
      },
      'Ten activities, Teacher, 3 Mar 2026: not scorable, 1 activity answered',
    ],
    [
      {
        kind: 'questionnaire',
        what: 'Eight actions',
        informant: 'child_demonstrated',
        score: formScore({ quotient: null, total: 22, answered: 8 }),
      },
      'Eight actions, Child showed it, 3 Mar 2026: total 22, 8 activities answered',
    ],
    [{ what: 'reaching', score: reaching }, 'Reaching across the midline, 3 Mar 2026: 14 left, 7 right'],
    [
      {
        what: 'pegs',
        score: {
          kind: 'pegs',
          unit: 'seconds',
          left: hand(21.34),
          right: hand(null),
          interrupted: 0,
          index: null,
          interval: null,
        },
      },
      'Moving pegs, 3 Mar 2026: left hand 21.3 s, right hand not measured',
    ],
    [
      {
        what: 'tapping',
        score: {
          kind: 'tapping',
          unit: 'count',
          left: hand(40),
          right: hand(0),
          interrupted: 0,
          index: -100,
          interval: null,
        },
      },
      'Tapping, 3 Mar 2026: left hand 40.0, right hand 0.0',
    ],
    [
      {
        what: 'sides',
        score: {
          kind: 'sides',
          foot: side('left'),
          eyeFar: side('mixed'),
          eyeNear: side(null),
          ear: side(null),
        },
      },
      'Foot, eye and ear, 3 Mar 2026: foot left, eye far off mixed',
    ],
    [{ what: 'seating', score: seating }, 'Seating measurements, 3 Mar 2026: size not measured'],
    [
      { what: 'seating', score: { ...seating, marks: [] } },
      'Seating measurements, 3 Mar 2026: outside the table of furniture sizes',
    ],
    [
      { what: 'seating', score: { ...seating, marks: [3, 4] } },
      'Seating measurements, 3 Mar 2026: furniture size 3 or 4',
    ],
    [{ what: 'dots', score: null }, 'Dots in circles, 3 Mar 2026: not done'],
    [{ kind: 'history', informant: 'guardian' }, 'History from the family, 3 Mar 2026'],
    [
      { kind: 'writing_observation', what: 'swaps' },
      'Writing observed, 3 Mar 2026: changed hands while writing',
    ],
    [{ kind: 'writing_observation', what: null }, 'Writing observed, 3 Mar 2026'],
    [{ kind: 'sample', what: 'copy' }, 'Handwriting sample: copying a sentence, 3 Mar 2026'],
    [{ kind: 'session_note', what: 'assessment' }, 'Note of assessment, 3 Mar 2026'],
    [
      { what: 'reaching', score: reaching, superseded: true },
      'Reaching across the midline, 3 Mar 2026: 14 left, 7 right (a newer one took its place)',
    ],
  ] as [Partial<EvidenceRow>, string][])('says %o as %s', (given, words) => {
    expect(evidenceWords(row(given))).toBe(words)
  })
})
