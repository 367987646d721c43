import { describe, expect, it } from 'vitest'
import { needsOf, type NeedFacts } from '../../shared/caseloadNeeds.ts'

// Thresholds are clinic settings and rules of this product; no source.
const rules = {
  today: '2026-12-01',
  now: new Date('2026-12-01T12:00:00Z'),
  waitTargetWeeks: 18,
  unsignedSoonHours: 24,
  unsignedOverdueHours: 48,
  letterTargetWorkingDays: 10,
  timeZone: 'Europe/London',
}
const quiet: NeedFacts = {
  state: 'active',
  receivedOn: '2026-06-01',
  nextReviewOn: '2027-02-01',
  unsignedNotes: 0,
  unsignedSince: null,
  countersignSince: null,
  draftSince: null,
  approvalSince: null,
  lettersFailed: 0,
  consented: true,
  consentEndsOn: null,
  task: null,
  tasks: 0,
}
const hoursAgo = (hours: number) => new Date(rules.now.getTime() - hours * 3_600_000)

describe('what waits for a therapist', () => {
  it.each([
    ['nothing', {}, []],
    ['a review in two weeks', { nextReviewOn: '2026-12-15' }, ['review soon']],
    ['a review today', { nextReviewOn: '2026-12-01' }, ['review due']],
    ['a review 35 days over', { nextReviewOn: '2026-10-27' }, ['review overdue']],
    ['a note of this morning', { unsignedNotes: 1, unsignedSince: hoursAgo(2) }, ['unsigned_note soon']],
    ['a note of 24 h', { unsignedNotes: 1, unsignedSince: hoursAgo(24) }, ['unsigned_note soon']],
    ['a note of 25 h', { unsignedNotes: 1, unsignedSince: hoursAgo(25) }, ['unsigned_note due']],
    ['a note of 52 h', { unsignedNotes: 2, unsignedSince: hoursAgo(52) }, ['unsigned_note overdue']],
    ['a countersignature of 8 days', { countersignSince: hoursAgo(192) }, ['countersign overdue']],
    ['a countersignature of today', { countersignSince: hoursAgo(1) }, ['countersign due']],
    ['a draft letter', { draftSince: hoursAgo(1) }, ['letter_draft soon']],
    ['a draft letter of 10 working days', { draftSince: hoursAgo(14 * 24) }, ['letter_draft soon']],
    ['a draft letter of 11 working days', { draftSince: hoursAgo(15 * 24) }, ['letter_draft overdue']],
    ['a letter to approve', { approvalSince: hoursAgo(1) }, ['letter_approval due']],
    [
      'a letter to approve of 11 working days',
      { approvalSince: hoursAgo(15 * 24) },
      ['letter_approval overdue'],
    ],
    ['a letter that failed', { lettersFailed: 1 }, ['letter_failed overdue']],
    ['therapy without consent', { consented: false }, ['consent overdue']],
    ['consent that ends in 30 days', { consentEndsOn: '2026-12-31' }, ['consent soon']],
    ['consent that ends in 31 days', { consentEndsOn: '2027-01-01' }, []],
    ['a task without a day', { task: { text: 'Call', dueOn: null }, tasks: 1 }, ['task soon']],
    ['a task of yesterday', { task: { text: 'Call', dueOn: '2026-11-30' }, tasks: 1 }, ['task overdue']],
    [
      'a wait of 137 days without consent',
      { state: 'waiting' as const, receivedOn: '2026-07-17', nextReviewOn: null, consented: false },
      ['wait overdue', 'consent soon'],
    ],
    ['a wait of 22 days', { state: 'waiting' as const, receivedOn: '2026-11-09', nextReviewOn: null }, []],
    [
      'a closed episode: review and consent end with it, an unsigned note does not',
      {
        state: 'discharged' as const,
        nextReviewOn: '2026-10-27',
        consented: false,
        unsignedNotes: 1,
        unsignedSince: hoursAgo(60),
      },
      ['unsigned_note overdue'],
    ],
  ])('%s', (_what, given, expected) => {
    const needs = needsOf({ ...quiet, ...given }, rules)
    expect(needs.map(({ kind, level }) => `${kind} ${level}`)).toEqual(expected)
  })

  it('puts the most pressing first and says it in words', () => {
    const needs = needsOf(
      {
        ...quiet,
        nextReviewOn: '2026-12-10',
        draftSince: hoursAgo(2),
        lettersFailed: 1,
        unsignedNotes: 3,
        unsignedSince: hoursAgo(30),
        task: { text: 'Call the family', dueOn: '2026-12-01' },
        tasks: 3,
      },
      rules,
    )
    expect(needs.map((need) => need.text)).toEqual([
      'A letter could not be delivered',
      '3 notes are not signed',
      'Call the family (and 2 more)',
      'Review due 10 Dec 2026',
      'A letter is being written',
    ])
  })
})
