import { number, type InferType } from 'yup'
import { body, id, optionalId, optionalText, text } from './fields.ts'

export const schoolSchema = body({
  name: text('The school’s name', { min: 2, max: 120 }),
  town: optionalText('The town', { max: 80 }),
})
export type SchoolDetails = InferType<typeof schoolSchema>

export const schoolClassSchema = body({
  schoolId: id('The school'),
  name: text('The class', { max: 60 }),
  /** First year of the school year: 2026 means 2026/27. */
  schoolYear: number().required('Enter the school year').integer().min(2000).max(2100),
  ages: optionalText('The ages', { max: 20 }),
  teacherId: optionalId('The teacher'),
})
export type SchoolClassDetails = InferType<typeof schoolClassSchema>

export interface SchoolView {
  id: string
  name: string
  town: string | null
  classes: {
    id: string
    name: string
    schoolYear: number
    ages: string | null
    teacher: { id: string; name: string } | null
    version: number
  }[]
  can: { change: boolean }
}

/** For choosing a class in forms. */
export interface ClassChoice {
  id: string
  label: string
}
