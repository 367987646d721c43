import { caseloadNeedKinds, type CaseloadNeedKind } from '@shared/caseload.ts'
import { episodeStateLabels, episodeStates } from '@shared/episodes.ts'

const needLabels: Record<CaseloadNeedKind, string> = {
  review: 'Review due',
  unsigned_note: 'Note to sign',
  countersign: 'Note to countersign',
  letter_draft: 'Letter in draft',
  letter_approval: 'Letter to approve',
  letter_failed: 'Letter not delivered',
  consent: 'Consent missing',
  task: 'Task',
  wait: 'Waiting too long',
}

export const needChoices = caseloadNeedKinds.map((value) => ({ value, label: needLabels[value] }))
export const stateChoices = episodeStates.map((value) => ({ value, label: episodeStateLabels[value] }))
export const showChoices = [
  { value: 'open', label: 'Open' },
  { value: 'closed', label: 'Closed' },
  { value: 'all', label: 'Open and closed' },
] as const
