import { formatDay, type Day } from '@shared/days.ts'
import {
  assentLabels,
  sessionTypeLabels,
  type Assent,
  type NoteDraft,
  type SessionType,
} from '@shared/sessionNotes.ts'

/** The four parts in the order of the trade. */
export const noteParts = [
  {
    key: 'said',
    letter: 'S',
    label: 'Said',
    hint: 'What the child and the family said, in their words.',
  },
  { key: 'observed', letter: 'O', label: 'Observed', hint: 'What was seen, counted or measured.' },
  { key: 'meaning', letter: 'A', label: 'Assessment', hint: 'What it means, and what speaks against it.' },
  { key: 'plan', letter: 'P', label: 'Plan', hint: 'What happens next, who does it, by when.' },
] as const

/** The facts of a session while they are typed: a date, a number or a choice may be empty until it is saved. */
export type NoteFacts = Pick<NoteDraft, 'startTime' | 'present'> & {
  heldOn: Day | null
  minutes: number | null
  type: SessionType | null
  assent: Assent | null
}
export type NoteInWork = NoteFacts & Pick<NoteDraft, 'said' | 'observed' | 'meaning' | 'plan' | 'goalIds'>

/** Only what may be written; the view around it (author, signatures, rights) stays behind. */
export const draftOf = (note: NoteDraft): NoteDraft => ({
  heldOn: note.heldOn,
  startTime: note.startTime,
  minutes: note.minutes,
  type: note.type,
  present: note.present,
  assent: note.assent,
  said: note.said,
  observed: note.observed,
  meaning: note.meaning,
  plan: note.plan,
  goalIds: [...note.goalIds],
})

const factsOf = (note: NoteDraft) =>
  [
    `${sessionTypeLabels[note.type]}, ${formatDay(note.heldOn)}, ${note.startTime}, ${note.minutes} minutes`,
    `Present: ${note.present ?? 'not written'}`,
    `Assent: ${assentLabels[note.assent]}`,
    `Goals touched: ${note.goalIds.length}`,
  ].join('\n')

/** The parts in which two drafts differ, both texts in full. */
export function differingParts(mine: NoteDraft, theirs: NoteDraft) {
  const parts = [
    { label: 'About the session', mine: factsOf(mine), theirs: factsOf(theirs) },
    ...noteParts.map(({ key, letter, label }) => ({
      label: `${letter}: ${label}`,
      mine: mine[key],
      theirs: theirs[key],
    })),
  ]
  return parts.filter((part) => part.mine !== part.theirs)
}
