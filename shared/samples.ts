import { boolean, number, type InferType } from 'yup'
import { dayField, type Day } from './days.ts'
import { body, choice, optionalChoice, optionalText } from './fields.ts'
import { sampleScripts, sampleTasks, smudgeLevels } from './handwriting.ts'
import type { SampleScript, SampleTask, SmudgeLevel } from './handwriting.ts'

export const sampleTypes = ['image/jpeg', 'image/png', 'image/webp', 'application/pdf'] as const
export type SampleType = (typeof sampleTypes)[number]
export const maximumImageBytes = 8 * 1024 * 1024
export const maximumPdfBytes = 10 * 1024 * 1024

const optionalCount = (label: string, max: number) =>
  number()
    .nullable()
    .defined()
    .integer(`${label} must be a whole number`)
    .min(0, `${label} cannot be below 0`)
    .max(max, `${label} can be at most ${max}`)

export const sampleDetailsSchema = body({
  takenOn: dayField('The date of the writing'),
  task: choice('the task', sampleTasks),
  script: choice('the script', sampleScripts),
  seconds: number().nullable().defined().min(30, 'At least 30 seconds').max(1800, 'At most 1800 seconds'),
  letters: optionalCount('Letters', 5000),
  legibleLetters: optionalCount('Readable letters', 5000).test(
    'within',
    'Readable letters cannot be more than the letters written',
    (value, { parent }) =>
      value === null || value === undefined || parent.letters === null || value <= parent.letters,
  ),
  reversals: optionalCount('Reversed letters', 500),
  smudge: optionalChoice('the smudging', smudgeLevels),
  lineAdherence: optionalCount('Keeping to the line', 5),
  otherChildVisible: boolean()
    .required('Say whether another child’s name is visible')
    .oneOf([false], 'Another child’s name is visible: cover or crop it, then choose the file again'),
  note: optionalText('The note', { max: 500 }),
})
export type SampleDetails = InferType<typeof sampleDetailsSchema>

export interface SampleView {
  id: string
  childId: string
  takenOn: Day
  ageThen: string
  task: SampleTask
  script: SampleScript
  seconds: number | null
  letters: number | null
  legibleLetters: number | null
  reversals: number | null
  smudge: SmudgeLevel | null
  lineAdherence: number | null
  note: string | null
  lettersPerMinute: number | null
  percentLegible: number | null
  contentType: SampleType
  bytes: number
  width: number | null
  height: number | null
  pixelsPerMm: number | null
  uploadedBy: string
  uploadedAt: string
  /** Text alternative made from the facts. */
  alt: string
  can: { remove: boolean }
}

export interface SampleWallView {
  samples: SampleView[]
  blocked: string | null
  can: { add: boolean }
}
