import type { GlanceView, TaskView } from '../../../shared/children.ts'
import { consentPurposeLabels, type ConsentPurpose } from '../../../shared/consents.ts'
import type { Day } from '../../../shared/days.ts'
import { isOpen } from '../../../shared/episodes.ts'
import { handProfileRows, withoutDetails } from '../../../shared/handProfile.ts'
import { lettersPerMinute, percentLegible } from '../../../shared/handwriting.ts'
import type { ClinicSettings } from '../../../shared/settings.ts'
import { attentionLevels } from '../../../shared/attention.ts'
import { dueLevel } from '../../../shared/tasks.ts'
import type { ChildAccess } from '../../access/childAccess.ts'
import { canAllocate, canChangeIdentity, seesClinicalFields, stateChoices } from '../../policies/children.ts'
import { canFinishTask } from '../../policies/tasks.ts'
import type { GlanceLists, LastOnRecord, TaskRow } from '../../queries/children/glance.ts'
import type { ChildFactsRow } from '../../queries/children/header.ts'
import type { HandEvidence } from '../../queries/handEvidence.ts'
import { fullName, presentChildHeader } from './header.ts'

/** Purposes whose absence stops something in the ordinary course of care. */
const expectedPurposes: readonly ConsentPurpose[] = [
  'assessment_treatment',
  'store_work_samples',
  'share_school_seating',
]

const presentTask = (row: TaskRow, child: ChildFactsRow, { viewer }: ChildAccess, today: Day): TaskView => ({
  id: row.id,
  text: row.text,
  dueOn: row.dueOn,
  level: dueLevel(row.dueOn, today),
  childId: child.id,
  childName: fullName(child),
  can: { finish: canFinishTask(viewer, { ...row, doneAt: null }) },
})

const byLevel = (one: TaskView, other: TaskView) =>
  attentionLevels.indexOf(other.level) - attentionLevels.indexOf(one.level)

export interface GlanceFacts {
  child: ChildFactsRow
  last: LastOnRecord
  lists: GlanceLists
  evidence: HandEvidence
}

export const presentGlance = (
  facts: GlanceFacts,
  access: ChildAccess,
  settings: ClinicSettings,
  today: Day,
): GlanceView => {
  const { child, last, lists, evidence } = facts
  const choices = stateChoices(access, child.state)
  const open = child.state !== null && isOpen(child.state)
  return {
    child: presentChildHeader(child, lists.alerts, access, settings, today),
    writingHand: child.writingHand,
    strengths: child.strengths,
    scriptDirection: child.scriptDirection,
    homeLanguages: child.homeLanguages,
    reason: child.reason,
    concerns: child.concerns,
    receivedOn: child.receivedOn,
    nextReviewOn: child.nextReviewOn,
    tasks: lists.tasks.map((task) => presentTask(task, child, access, today)).toSorted(byLevel),
    lateralLine: handProfileRows(evidence.responses, evidence.measures).map(withoutDetails),
    lastNote: last.note && {
      id: last.note.id,
      heldOn: last.note.heldOn,
      plan: last.note.plan,
      signed: last.note.state === 'signed',
    },
    goals: lists.goals.map(({ id, activity, level }) => ({ id, text: activity, level })),
    lastSample: last.sample && {
      id: last.sample.id,
      takenOn: last.sample.takenOn,
      lettersPerMinute: lettersPerMinute(last.sample),
      percentLegible: percentLegible({
        legible: last.sample.legibleLetters,
        attempted: last.sample.letters,
      }),
    },
    lastLetter: last.letter && { id: last.letter.id, state: last.letter.state, at: last.letter.changedAt },
    consentMissing: open
      ? expectedPurposes
          .filter((purpose) => !child.consentsInForce.includes(purpose))
          .map((purpose) => consentPurposeLabels[purpose])
      : [],
    history: lists.changes.map(({ from, to, reason, by, at }) => ({
      from,
      to,
      reason,
      by,
      at: at.toISOString(),
    })),
    episodeVersion: child.episodeVersion,
    version: child.version,
    nextStates: choices,
    can: {
      changeState: choices.length > 0,
      changeCare: seesClinicalFields(access),
      allocate: canAllocate(access, child.state),
      changeIdentity: canChangeIdentity(access),
    },
  }
}
