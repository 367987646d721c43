import { formsOfTheStart } from '../../server/migrations/1764580000000-formsOfTheStart.ts'
import type { FormView } from '../../shared/forms.ts'

/** A form the clinic starts with, as the server shows it. */
export const startForm = (key: string, more: Partial<FormView> = {}): FormView => {
  const form = formsOfTheStart.find((candidate) => candidate.key === key)
  if (!form) throw new Error(`There is no form ${key}`)
  const { edition, definition } = form
  return {
    id: `${key}.v${edition}`,
    key,
    edition,
    definition: structuredClone(definition),
    retiredAt: null,
    ...more,
  }
}

export const startForms = (): FormView[] => formsOfTheStart.map(({ key }) => startForm(key))
