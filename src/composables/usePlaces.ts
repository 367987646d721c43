import { computed } from 'vue'
import type { Role } from '@shared/roles.ts'
import { useSessionStore } from '@/stores/session.ts'

/** One entry of the header row. `area` is the start of every address that belongs to it. */
export interface Place {
  name: string
  label: string
  area: string
}

const places: (Place & { roles: readonly Role[] })[] = [
  { name: 'today', label: 'Today', area: '/today', roles: ['therapist', 'clinicLead', 'administrator'] },
  { name: 'caseload', label: 'Caseload', area: '/caseload', roles: ['therapist', 'clinicLead'] },
  { name: 'register', label: 'Register', area: '/register', roles: ['administrator'] },
  {
    name: 'referrals',
    label: 'Referrals',
    area: '/referrals',
    roles: ['therapist', 'clinicLead', 'administrator'],
  },
  { name: 'letters', label: 'Letters', area: '/letters', roles: ['therapist', 'clinicLead'] },
  {
    name: 'schools',
    label: 'Schools',
    area: '/schools',
    roles: ['therapist', 'clinicLead', 'administrator'],
  },
  { name: 'review', label: 'Clinic review', area: '/review', roles: ['clinicLead'] },
  { name: 'settings', label: 'Settings', area: '/settings', roles: ['clinicLead', 'administrator'] },
  { name: 'people', label: 'People', area: '/people', roles: ['clinicLead', 'administrator'] },
  { name: 'classes', label: 'My classes', area: '/classes', roles: ['teacher'] },
  { name: 'my-children', label: 'My child', area: '/my-child', roles: ['guardian'] },
]

/** The places open to the signed-in person, in the order of a working day. */
export function usePlaces() {
  const session = useSessionStore()
  return computed<Place[]>(() => places.filter((place) => session.can(...place.roles)))
}
