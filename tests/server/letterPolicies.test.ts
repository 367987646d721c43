import { describe, expect, it } from 'vitest'
import type { ChildAccess } from '../../server/access/childAccess.ts'
import {
  canApproveLetter,
  canChangeLetter,
  canRecallLetter,
  letterRefusal,
  type LetterRule,
  type LetterStanding,
} from '../../server/policies/letters.ts'

const accessAs = (relation: ChildAccess['relation'], id: string): ChildAccess => ({
  childId: 'child',
  viewer: {
    id,
    displayName: 'Person',
    roles: [relation === 'clinicLead' ? 'clinicLead' : 'therapist'],
    newlyQualified: false,
  },
  relation,
  guardianId: null,
  schoolScopes: [],
})
const author = accessAs('assignedTherapist', 'author')
const lead = accessAs('clinicLead', 'lead')

const standing = (state: LetterStanding['state'], newlyQualified = false): LetterStanding => ({
  state,
  authorId: 'author',
  authorNewlyQualified: newlyQualified,
})

/* Common practice, no source: what is closed to everybody is a conflict, what is another's step is forbidden. */
describe('how a step on a letter is refused', () => {
  it.each<[string, ChildAccess, LetterStanding, LetterRule, ReturnType<typeof letterRefusal>]>([
    ['the author changes a draft', author, standing('draft'), canChangeLetter, null],
    ['the author changes an approved letter', author, standing('approved'), canChangeLetter, 'closed'],
    ['the author changes a letter that left', author, standing('sent'), canChangeLetter, 'closed'],
    ['the lead changes a draft', lead, standing('draft'), canChangeLetter, 'forbidden'],
    ['the lead changes an approved letter', lead, standing('approved'), canChangeLetter, 'forbidden'],
    ['the lead changes a letter that left', lead, standing('sent'), canChangeLetter, 'closed'],
    ['the lead approves what waits', lead, standing('awaiting_approval'), canApproveLetter, null],
    ['the lead approves a draft', lead, standing('draft'), canApproveLetter, 'forbidden'],
    ['a newly qualified author approves', author, standing('draft', true), canApproveLetter, 'closed'],
    ['the lead recalls what is queued', lead, standing('queued'), canRecallLetter, null],
    ['the lead recalls what is recalled', lead, standing('recalled'), canRecallLetter, 'closed'],
  ])('when %s', (_what, access, letter, may, expected) => {
    expect(letterRefusal(access, letter, may)).toBe(expected)
  })
})
