import type { DemoObservation, Offset } from './demoTypes.ts'
import type { StaffKey } from './people.ts'

const notLookedAt: Omit<DemoObservation, 'child' | 'observedDay' | 'by'> = {
  writingHand: 'left',
  paperOffsetCm: null,
  paperTiltDegrees: null,
  otherHandSteadies: null,
  wristPosture: null,
  wristExtensionDegrees: null,
  grip: null,
  fingerToTipMm: null,
  pressure: null,
  minutesWritten: null,
  painBefore: null,
  painAfter: null,
  deskType: null,
  elbowClash: null,
  leftClearanceCm: null,
  lightSide: null,
  feetFlat: null,
  deskAboveElbowCm: null,
  note: null,
}

type Looked = Partial<typeof notLookedAt>

/** Where and how the paper lies and is held. */
export const paper = (
  paperOffsetCm: number,
  paperTiltDegrees: number,
  otherHandSteadies: NonNullable<Looked['otherHandSteadies']>,
): Looked => ({ paperOffsetCm, paperTiltDegrees, otherHandSteadies })

/** How the pencil is held; finger to tip in mm. */
export const pencil = (
  grip: NonNullable<Looked['grip']>,
  wristPosture: NonNullable<Looked['wristPosture']>,
  fingerToTipMm: number,
  pressure: NonNullable<Looked['pressure']>,
): Looked => ({ grip, wristPosture, fingerToTipMm, pressure })

/** Pain before writing and after ten minutes, 0 to 10. */
export const pain = (painBefore: number, painAfter: number): Looked => ({ painBefore, painAfter })

/** The place in class; clearance on the left and desk above elbow in cm. */
export const place = (
  deskType: NonNullable<Looked['deskType']>,
  elbowClash: NonNullable<Looked['elbowClash']>,
  leftClearanceCm: number,
  lightSide: NonNullable<Looked['lightSide']>,
  feetFlat: NonNullable<Looked['feetFlat']>,
  deskAboveElbowCm: number,
): Looked => ({ deskType, elbowClash, leftClearanceCm, lightSide, feetFlat, deskAboveElbowCm })

/** One look at a child writing. What is not named was not looked at. */
export const seen = (
  child: number,
  observedDay: Offset,
  by: StaffKey,
  ...looked: Looked[]
): DemoObservation => ({
  ...notLookedAt,
  ...looked.reduce((all, one) => ({ ...all, ...one }), {}),
  child,
  observedDay,
  by,
})
