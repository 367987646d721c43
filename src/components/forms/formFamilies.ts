import { everydayFormKey, type FormView } from '@shared/forms.ts'

/** A form with all its editions. */
export interface FormFamily {
  key: string
  /** In use, or the newest where none is. */
  current: FormView
  /** The others, newest first. */
  others: FormView[]
}

/** Editions put together by form: those in use first, among them the everyday one, then by title. */
export function formFamilies(forms: readonly FormView[]): FormFamily[] {
  const keys = [...new Set(forms.map(({ key }) => key))]
  const families = keys.flatMap((key) => {
    const editions = forms.filter((form) => form.key === key).toSorted((a, b) => b.edition - a.edition)
    const current = editions.find(({ retiredAt }) => retiredAt === null) ?? editions[0]
    return current ? [{ key, current, others: editions.filter(({ id }) => id !== current.id) }] : []
  })
  return families.toSorted(
    (a, b) =>
      Number(a.current.retiredAt !== null) - Number(b.current.retiredAt !== null) ||
      Number(b.key === everydayFormKey) - Number(a.key === everydayFormKey) ||
      a.current.definition.title.localeCompare(b.current.definition.title, 'en-GB'),
  )
}
