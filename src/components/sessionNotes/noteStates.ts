import type { NoteState } from '@shared/sessionNotes.ts'

export const noteStateLabels: Record<NoteState, string> = {
  draft: 'Draft',
  awaiting_countersignature: 'Waits for countersignature',
  signed: 'Signed',
}

export const noteStateTone = (state: NoteState) =>
  (({ draft: 'pollen', awaiting_countersignature: 'rain', signed: 'leaf' }) as const)[state]
