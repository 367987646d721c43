import type { Viewer } from '../access/actor.ts'
import type { StaffRelation } from './staffScope.ts'
import { listWork, type WorkListId, type WorkMoment, type WorkRow } from './workLists.ts'

interface TodayGroup {
  id: string
  label: string
  list: WorkListId
  relation: StaffRelation
}

export interface TodayGroupRows extends TodayGroup {
  rows: WorkRow[]
  total: number
}

const forLead: TodayGroup[] = [
  { id: 'alerts', label: 'Warning signs', list: 'alerts_open', relation: 'clinicLead' },
  { id: 'tasks', label: 'To do', list: 'tasks', relation: 'clinicLead' },
  { id: 'letters', label: 'Letters to approve', list: 'letters_to_approve', relation: 'clinicLead' },
  { id: 'letters-failed', label: 'Letters not delivered', list: 'letters_failed', relation: 'clinicLead' },
  { id: 'countersign', label: 'Notes to countersign', list: 'notes_to_countersign', relation: 'clinicLead' },
  { id: 'notes-late', label: 'Notes long unsigned', list: 'notes_unsigned_48', relation: 'clinicLead' },
  {
    id: 'reviews-late',
    label: 'Reviews over four weeks late',
    list: 'reviews_escalated',
    relation: 'clinicLead',
  },
  { id: 'referrals', label: 'Referrals to look at', list: 'referrals_undecided', relation: 'clinicLead' },
]

const forTherapist: TodayGroup[] = [
  { id: 'alerts', label: 'Warning signs', list: 'alerts_open', relation: 'assignedTherapist' },
  { id: 'tasks', label: 'To do', list: 'tasks', relation: 'assignedTherapist' },
  { id: 'notes', label: 'Notes to sign', list: 'notes_own', relation: 'assignedTherapist' },
  {
    id: 'countersign',
    label: 'Notes to countersign',
    list: 'notes_to_countersign',
    relation: 'assignedTherapist',
  },
  {
    id: 'letters-failed',
    label: 'Letters not delivered',
    list: 'letters_failed',
    relation: 'assignedTherapist',
  },
  { id: 'letters-own', label: 'Letters to finish', list: 'letters_own', relation: 'assignedTherapist' },
  { id: 'reviews', label: 'Reviews', list: 'reviews_due', relation: 'assignedTherapist' },
  {
    id: 'referrals',
    label: 'Referrals to look at',
    list: 'referrals_undecided',
    relation: 'assignedTherapist',
  },
]

const forOffice: TodayGroup[] = [
  { id: 'tasks', label: 'To do', list: 'tasks', relation: 'administrator' },
  { id: 'referrals', label: 'Referrals not decided', list: 'referrals_undecided', relation: 'administrator' },
]

/** What the roles look at, each group once: the wider view comes first and wins. */
const groupsFor = ({ roles }: Viewer): TodayGroup[] => {
  const wanted = [
    ...(roles.includes('clinicLead') ? forLead : []),
    ...(roles.includes('therapist') ? forTherapist : []),
    ...(roles.includes('administrator') ? forOffice : []),
  ]
  return wanted.filter((group, index) => wanted.findIndex((other) => other.id === group.id) === index)
}

/** Lines of each group on the page; the count says how many there are in all. */
const linesShown = 5

/** What waits for this person, group by group. */
export const listToday = (viewer: Viewer, moment: WorkMoment): Promise<TodayGroupRows[]> =>
  Promise.all(
    groupsFor(viewer).map(async (group) => {
      const { list, relation } = group
      const found = await listWork(list, { viewer, relation }, moment, { size: linesShown, offset: 0 })
      return { ...group, ...found }
    }),
  )
