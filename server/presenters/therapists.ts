import type { TherapistChoice } from '../../shared/users.ts'
import type { Viewer } from '../access/actor.ts'
import { seesOpenCases } from '../policies/therapists.ts'
import type { TherapistRow } from '../queries/therapists.ts'

export const presentTherapist = (row: TherapistRow, viewer: Viewer): TherapistChoice => ({
  id: row.id,
  displayName: row.displayName,
  openCases: seesOpenCases(viewer) ? row.openCases : null,
})
