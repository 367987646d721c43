import { CreateClinic1764547200000 } from './1764547200000-CreateClinic.ts'
import { CloseWhatIsClosed1764547300000 } from './1764547300000-CloseWhatIsClosed.ts'
import { AddDecisionReasons1764547400000 } from './1764547400000-AddDecisionReasons.ts'
import { AddGoalEndReason1764547500000 } from './1764547500000-AddGoalEndReason.ts'
import { AddAssessment1764580000000 } from './1764580000000-AddAssessment.ts'

/** In order of time. */
export const migrations = [
  CreateClinic1764547200000,
  CloseWhatIsClosed1764547300000,
  AddDecisionReasons1764547400000,
  AddGoalEndReason1764547500000,
  AddAssessment1764580000000,
]
