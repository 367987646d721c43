import type { FormDefinition, FormView } from '@shared/forms.ts'
import { informantLabels } from '@shared/questionnaires.ts'

const numbers = ['no', 'one', 'two', 'three', 'four', 'five', 'six', 'seven', 'eight', 'nine', 'ten']

/** 'ten activities' */
export const activitiesWords = ({ items }: Pick<FormDefinition, 'items'>): string =>
  `${numbers[items.length] ?? items.length} ${items.length === 1 ? 'activity' : 'activities'}`

export const capitalised = (words: string): string => words.charAt(0).toUpperCase() + words.slice(1)

/** 'parent or carer, child showed it' */
export const informantsWords = ({ informants }: Pick<FormDefinition, 'informants'>): string =>
  informants.map((informant) => informantLabels[informant].toLowerCase()).join(', ')

export const isInUse = ({ retiredAt }: Pick<FormView, 'retiredAt'>): boolean => retiredAt === null
