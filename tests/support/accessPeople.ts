import type { Role } from '../../shared/roles.ts'
import type { Standing } from '../server/accessFixture.ts'

/*
 * One clinic with everybody the access matrix names. Children: `first` is shared with everyone who may be concerned,
 * `second` is somebody else's, three belong to a teacher whose families do not share (withdrew, ran out, never said
 * yes), and one has come of age.
 */
export const childKeys = ['first', 'second', 'withdrawn', 'expired', 'never', 'grown'] as const
export type ChildKey = (typeof childKeys)[number]

interface Part {
  roles: readonly Role[]
  /** Which child this person is looked at with first. */
  own: ChildKey
  stands: Partial<Record<ChildKey, Standing>>
  otherwise: Standing
}

const part = (roles: Role[], own: ChildKey, otherwise: Standing, stands: Part['stands'] = {}): Part => ({
  roles,
  own,
  stands,
  otherwise,
})

/** Everybody the sweep signs in, and how each stands to each child. */
export const parts = {
  T1: part(['therapist'], 'first', 'T2', {
    first: 'T1',
    withdrawn: 'T1',
    expired: 'T1',
    never: 'T1',
    grown: 'T1',
  }),
  T2: part(['therapist'], 'first', 'T2', { second: 'T1' }),
  L: part(['clinicLead'], 'first', 'L'),
  'lead who treats': part(['clinicLead', 'therapist'], 'first', 'L', { first: 'T1' }),
  E1: part(['teacher'], 'first', 'EX', { first: 'E1' }),
  'E0 withdrawn': part(['teacher'], 'withdrawn', 'EX', { withdrawn: 'E0', expired: 'E0', never: 'E0' }),
  'E0 expired': part(['teacher'], 'expired', 'EX', { withdrawn: 'E0', expired: 'E0', never: 'E0' }),
  'E0 never': part(['teacher'], 'never', 'EX', { withdrawn: 'E0', expired: 'E0', never: 'E0' }),
  EX: part(['teacher'], 'first', 'EX', { second: 'E1', grown: 'E1' }),
  'EX former class': part(['teacher'], 'first', 'EX'),
  G1: part(['guardian'], 'first', 'GX', { first: 'G1' }),
  'G0 restricted': part(['guardian'], 'first', 'GX', { first: 'G0' }),
  'G0 unverified': part(['guardian'], 'first', 'GX', { first: 'G0' }),
  'G0 ended': part(['guardian'], 'first', 'GX', { first: 'G0' }),
  'G0 child of age': part(['guardian'], 'grown', 'GX', { grown: 'G0' }),
  GX: part(['guardian'], 'first', 'GX', { second: 'G1' }),
  'teacher and carer': part(['teacher', 'guardian'], 'first', 'EX', { first: 'G1' }),
  AD: part(['administrator'], 'first', 'AD'),
  'lead and carer': part(['clinicLead', 'guardian'], 'first', 'L', { first: 'G1' }),
  'restricted lead': part(['clinicLead', 'guardian'], 'first', 'L', { first: 'G0' }),
  'restricted administrator': part(['administrator', 'guardian'], 'first', 'AD', { first: 'G0' }),
  disabled: part(['therapist'], 'first', 'T2', { first: 'T1' }),
} satisfies Record<string, Part>
export type PersonKey = keyof typeof parts
export const personKeys = Object.keys(parts) as PersonKey[]

export const standingOf = (person: PersonKey, child: ChildKey): Standing => {
  const { stands, otherwise }: Part = parts[person]
  return stands[child] ?? otherwise
}
