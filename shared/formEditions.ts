import { array, string, ValidationError, type InferType } from 'yup'
import { body, choice, choices, optionalChoice, optionalText, text } from './fields.ts'
import { scoringMethods, type FormDefinition } from './forms.ts'
import { cutOffSets, handUseAnswers } from './handUse.ts'
import { informants } from './questionnaires.ts'

/** Longest texts of an edition, in characters. */
export const formLimits = { title: 80, purpose: 300, label: 160, caution: 240, citation: 1000 } as const

const item = body({
  id: string().required('The activity has no name').max(32, 'The activity is not known'),
  label: text('The activity', { max: formLimits.label }),
  childLabel: optionalText('The words to the child', { max: formLimits.label }),
  caution: optionalText('The caution', { max: formLimits.caution }),
})

/** A new edition of a form: its words change, its activities, answers and method stay. */
export const formEditionSchema = body({
  key: string().required('Choose a form').max(32, 'Choose a form from the list'),
  definition: body({
    title: text('The title', { max: formLimits.title }),
    purpose: text('The purpose', { max: formLimits.purpose }),
    scoring: choice('the method', scoringMethods),
    items: array(item).required('The activities are missing').max(40, 'A form has at most 40 activities'),
    options: choices('the answers', handUseAnswers),
    informants: choices('who may answer', informants).min(1, 'Choose at least one who may answer'),
    citation: text('The source', { max: formLimits.citation }),
    cautions: array(text('A caution', { max: formLimits.caution }))
      .required('The cautions are missing')
      .min(1, 'At least one caution stands beside the score')
      .max(8, 'At most eight cautions'),
    cutOffSet: optionalChoice(
      'the cut-offs',
      cutOffSets.map((set) => set.id),
    ),
  }),
})
export type FormEdition = InferType<typeof formEditionSchema>

const same = (one: readonly string[], other: readonly string[]) =>
  one.length === other.length && one.every((value, index) => value === other[index])

/**
 * What a new edition may not do to the one before it, by field; empty when it may be made. Answers to two editions are
 * compared item by item, so activities, answers and method stay: another set is another form. A caution may be reworded,
 * not left out.
 */
export function editionProblems(before: FormDefinition, next: FormDefinition): Record<string, string> {
  const found: Record<string, string> = {}
  if (next.scoring !== before.scoring) found['definition.scoring'] = 'A new edition keeps the method'
  if (!same(next.options, before.options)) found['definition.options'] = 'A new edition keeps the answers'
  if (next.cutOffSet !== before.cutOffSet) found['definition.cutOffSet'] = 'A new edition keeps the cut-offs'
  const ids = (definition: FormDefinition) => definition.items.map(({ id }) => id)
  if (!same(ids(next), ids(before))) {
    found['definition.items'] = 'A new edition keeps its activities and their order; only the words change'
    return found
  }
  const shown = next.informants.includes('child_demonstrated')
  next.items.forEach(({ childLabel, caution }, index) => {
    if (shown && childLabel === null)
      found[`definition.items[${index}].childLabel`] = 'Enter what is said to the child, who may show it'
    if (caution === null && before.items[index]?.caution !== null)
      found[`definition.items[${index}].caution`] = 'This activity needs a caution: reword it, but keep one'
  })
  return found
}

/** The schema of the edition that follows `before`, so that a form is checked by the rules the server keeps. */
export const editionSchemaAfter = (before: FormDefinition) =>
  formEditionSchema.test('keeps', (value, context) => {
    const next = value.definition as Partial<FormDefinition> | undefined
    if (!next?.items || !next.options || !next.informants) return true
    const problems = Object.entries(editionProblems(before, next as FormDefinition))
    if (problems.length === 0) return true
    return new ValidationError(problems.map(([path, message]) => context.createError({ path, message })))
  })
