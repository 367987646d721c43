import type { WritingHand } from '@shared/children.ts'
import { writingHandLabels } from '@shared/children.ts'
import {
  deskTypeLabels,
  gripLabels,
  wristPostureLabels,
  type LightSide,
  type Pressure,
  type Steadying,
  type WritingObservationView,
  type YesNo,
} from '@shared/writingObservations.ts'

export const pressureLabels: Record<Pressure, string> = { light: 'Light', medium: 'Medium', heavy: 'Heavy' }
export const steadyingLabels: Record<Steadying, string> = { yes: 'Yes', partly: 'Partly', no: 'No' }
export const yesNoLabels: Record<YesNo, string> = { yes: 'Yes', no: 'No' }
export const lightSideLabels: Record<LightSide, string> = {
  left: 'The left',
  right: 'The right',
  front: 'The front',
  behind: 'Behind',
  above: 'Above',
}

const signed = (value: number, minus: string, plus: string, unit: string) =>
  value === 0 ? `0 ${unit}` : `${Math.abs(value)} ${unit} ${value < 0 ? minus : plus}`

/** What was looked at, in the order of the form, in words; what was not looked at is left out. */
export function observedFacts(seen: WritingObservationView): { label: string; value: string }[] {
  const facts: { label: string; value: string | null }[] = [
    { label: 'Writes with', value: seen.writingHand && writingHandLabels[seen.writingHand as WritingHand] },
    {
      label: 'Paper',
      value:
        seen.paperOffsetCm === null ? null : signed(seen.paperOffsetCm, 'to the left', 'to the right', 'cm'),
    },
    {
      label: 'Paper turned',
      value:
        seen.paperTiltDegrees === null
          ? null
          : signed(seen.paperTiltDegrees, 'anticlockwise', 'clockwise', 'degrees'),
    },
    {
      label: 'Other hand holds it',
      value: seen.otherHandSteadies && steadyingLabels[seen.otherHandSteadies],
    },
    { label: 'Hand to the line', value: seen.wristPosture && wristPostureLabels[seen.wristPosture] },
    {
      label: 'Wrist bent back',
      value:
        seen.wristExtensionDegrees === null
          ? null
          : signed(seen.wristExtensionDegrees, 'forward', 'back', 'degrees'),
    },
    { label: 'Grip', value: seen.grip && gripLabels[seen.grip] },
    { label: 'Finger to tip', value: seen.fingerToTipMm === null ? null : `${seen.fingerToTipMm} mm` },
    { label: 'Pressure', value: seen.pressure && pressureLabels[seen.pressure] },
    {
      label: 'Minutes written',
      value: seen.minutesWritten === null ? null : `${seen.minutesWritten} minutes`,
    },
    { label: 'Pain before', value: seen.painBefore === null ? null : `${seen.painBefore} of 10` },
    { label: 'Pain after ten minutes', value: seen.painAfter === null ? null : `${seen.painAfter} of 10` },
    { label: 'Desk', value: seen.deskType && deskTypeLabels[seen.deskType] },
    { label: 'Elbows meet', value: seen.elbowClash && yesNoLabels[seen.elbowClash] },
    {
      label: 'Free space on the left',
      value: seen.leftClearanceCm === null ? null : `${seen.leftClearanceCm} cm`,
    },
    { label: 'Light from', value: seen.lightSide && lightSideLabels[seen.lightSide].toLowerCase() },
    { label: 'Feet flat', value: seen.feetFlat && yesNoLabels[seen.feetFlat] },
    {
      label: 'Desk to the bent elbow',
      value: seen.deskAboveElbowCm === null ? null : signed(seen.deskAboveElbowCm, 'below', 'above', 'cm'),
    },
  ]
  return facts.flatMap(({ label, value }) => (value === null ? [] : [{ label, value }]))
}
