/** What a person may be to the clinic. A person may hold several; rights follow the relation to the child. */
export const roles = ['therapist', 'clinicLead', 'administrator', 'guardian', 'teacher'] as const
export type Role = (typeof roles)[number]

export const roleLabels: Record<Role, string> = {
  therapist: 'Therapist',
  clinicLead: 'Clinic lead',
  administrator: 'Administrator',
  guardian: 'Parent or carer',
  teacher: 'Teacher',
}

export const staffRoles: readonly Role[] = ['therapist', 'clinicLead', 'administrator']

export const isStaff = (held: readonly Role[]) => held.some((role) => staffRoles.includes(role))

/** How a viewer stands to one child. Exactly one applies at a time and is written into the audit trail. */
export const childRelations = [
  'guardian',
  'assignedTherapist',
  'clinicLead',
  'teacher',
  'administrator',
] as const
export type ChildRelation = (typeof childRelations)[number]

export const hands = ['left', 'right'] as const
export type Hand = (typeof hands)[number]
