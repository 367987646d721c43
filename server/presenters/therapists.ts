import type { TherapistChoice } from '../../shared/users.ts'
import type { TherapistRow } from '../queries/therapists.ts'

export const presentTherapist = (row: TherapistRow): TherapistChoice => ({
  id: row.id,
  displayName: row.displayName,
  openCases: row.openCases,
})
