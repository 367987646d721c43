import { number, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, optionalChoice, optionalText } from './fields.ts'

/** Posture, paper, grip and seat as seen on one day (domain: grip, wrist, paper, seating fit). Null is "not looked at". */
export const grips = [
  'dynamic_tripod',
  'dynamic_quadrupod',
  'lateral_tripod',
  'lateral_quadrupod',
  'cross_thumb',
  'palmar',
  'changing',
  'other',
] as const
export type Grip = (typeof grips)[number]
export const gripLabels: Record<Grip, string> = {
  dynamic_tripod: 'Dynamic tripod',
  dynamic_quadrupod: 'Dynamic quadrupod',
  lateral_tripod: 'Lateral tripod',
  lateral_quadrupod: 'Lateral quadrupod',
  cross_thumb: 'Cross thumb',
  palmar: 'Palmar',
  changing: 'Changing',
  other: 'Other',
}
export const matureGrips: readonly Grip[] = [
  'dynamic_tripod',
  'dynamic_quadrupod',
  'lateral_tripod',
  'lateral_quadrupod',
]

export const wristPostures = ['below_line', 'beside_line', 'above_line'] as const
export type WristPosture = (typeof wristPostures)[number]
export const wristPostureLabels: Record<WristPosture, string> = {
  below_line: 'Below the line',
  beside_line: 'Beside the line',
  above_line: 'Above the line',
}

export const pressures = ['light', 'medium', 'heavy'] as const
export type Pressure = (typeof pressures)[number]
export const steadyings = ['yes', 'partly', 'no'] as const
export type Steadying = (typeof steadyings)[number]
export const deskTypes = ['single', 'double', 'group_table', 'side_tablet'] as const
export type DeskType = (typeof deskTypes)[number]
export const deskTypeLabels: Record<DeskType, string> = {
  single: 'Single desk',
  double: 'Desk for two',
  group_table: 'Group table',
  side_tablet: 'Chair with a side tablet',
}
export const lightSides = ['left', 'right', 'front', 'behind', 'above'] as const
export type LightSide = (typeof lightSides)[number]
export const yesNo = ['yes', 'no'] as const
export type YesNo = (typeof yesNo)[number]

const measure = (label: string, min: number, max: number, unit: string) =>
  number()
    .nullable()
    .defined()
    .min(min, `${label}: ${min} to ${max} ${unit}`)
    .max(max, `${label}: ${min} to ${max} ${unit}`)

/** A measure that came later: forms and rows from before it have no such field, which reads as "not looked at". */
const laterMeasure = (label: string, min: number, max: number, unit: string) =>
  measure(label, min, max, unit).optional().default(null)

export const writingObservationSchema = body({
  observedOn: dayField('The date'),
  writingHand: optionalChoice('the writing hand', ['left', 'right', 'swaps'] as const),
  paperOffsetCm: measure('Paper from the midline', -30, 30, 'cm, minus is left'),
  paperTiltDegrees: measure('Paper turned', -60, 60, 'degrees, plus is clockwise'),
  otherHandSteadies: optionalChoice('whether the other hand steadies', steadyings),
  wristPosture: optionalChoice('the wrist', wristPostures),
  /** Estimated; minus is bent towards the palm. */
  wristExtensionDegrees: laterMeasure('Wrist bent back', -40, 60, 'degrees, minus is bent forward'),
  grip: optionalChoice('the grip', grips),
  fingerToTipMm: measure('Finger to tip', 5, 70, 'mm'),
  pressure: optionalChoice('the pressure', pressures),
  minutesWritten: laterMeasure('Minutes written', 1, 60, 'minutes'),
  painBefore: measure('Pain before', 0, 10, ''),
  painAfter: measure('Pain after ten minutes', 0, 10, ''),
  deskType: optionalChoice('the desk', deskTypes),
  elbowClash: optionalChoice('whether elbows meet', yesNo),
  leftClearanceCm: measure('Free space on the left', 0, 300, 'cm'),
  lightSide: optionalChoice('where the light comes from', lightSides),
  feetFlat: optionalChoice('whether the feet are flat', yesNo),
  deskAboveElbowCm: measure('Desk above the bent elbow', -20, 30, 'cm'),
  note: optionalText('The note', { max: 1000 }),
})
export type WritingObservationDetails = InferType<typeof writingObservationSchema>

/** Fields that rows from before them do not have. */
export const laterObserved = { wristExtensionDegrees: null, minutesWritten: null } as const

export interface WritingObservationView extends WritingObservationDetails {
  id: string
  observedBy: string
  recordedAt: string
  observedOn: Day
}
