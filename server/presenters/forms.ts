import type { FormView } from '../../shared/forms.ts'
import type { FormRecord } from '../queries/forms.ts'

export const presentForm = ({ id, key, edition, definition, retiredAt }: FormRecord): FormView => ({
  id,
  key,
  edition,
  definition,
  retiredAt: retiredAt?.toISOString() ?? null,
})
