import type { WritingObservationView } from '../../shared/writingObservations.ts'
import type { ObservationRecord } from '../queries/writingObservations.ts'

export const presentObservation = ({
  id,
  details,
  observedBy,
  recordedAt,
}: ObservationRecord): WritingObservationView => ({
  id,
  observedOn: details.observedOn,
  observedBy,
  recordedAt: recordedAt.toISOString(),
  writingHand: details.writingHand,
  paperOffsetCm: details.paperOffsetCm,
  paperTiltDegrees: details.paperTiltDegrees,
  otherHandSteadies: details.otherHandSteadies,
  wristPosture: details.wristPosture,
  wristExtensionDegrees: details.wristExtensionDegrees,
  grip: details.grip,
  fingerToTipMm: details.fingerToTipMm,
  pressure: details.pressure,
  minutesWritten: details.minutesWritten,
  painBefore: details.painBefore,
  painAfter: details.painAfter,
  deskType: details.deskType,
  elbowClash: details.elbowClash,
  leftClearanceCm: details.leftClearanceCm,
  lightSide: details.lightSide,
  feetFlat: details.feetFlat,
  deskAboveElbowCm: details.deskAboveElbowCm,
  note: details.note,
})
