import { database } from '../../../server/dataSource.ts'
import { fromJson } from '../../../server/queries/sql.ts'
import type { FormDefinition } from '../../../shared/forms.ts'
import type { Calls } from './call.ts'

const key = 'short-4'
const first = `${key}.v1`
const state = (id: string, retired: boolean) =>
  database().query(`UPDATE questionnaire_forms SET retiredAt = ${retired ? 'NOW(6)' : 'NULL'} WHERE id = ?`, [
    id,
  ])

/** Only the first edition is in use, whatever earlier calls made of it. */
const onlyFirst = async (retired: boolean) => {
  await database().query('UPDATE questionnaire_forms SET retiredAt = NOW(6) WHERE formKey = ?', [key])
  await state(first, retired)
}

/** Questionnaires as the lead keeps them. */
export const formCalls: Calls = {
  'GET /api/forms': () => ({}),
  'POST /api/forms': async () => {
    await onlyFirst(false)
    const [{ editions, definition }] = (await database().query(
      `SELECT COUNT(*) AS editions, (SELECT definition FROM questionnaire_forms WHERE id = ?) AS definition
       FROM questionnaire_forms WHERE formKey = ?`,
      [first, key],
    )) as [{ editions: number; definition: string }]
    const words = fromJson<FormDefinition>(definition)
    return { body: { key, definition: { ...words, purpose: `${words.purpose} (${Number(editions) + 1})` } } }
  },
  'POST /api/forms/:id/retire': async () => {
    await onlyFirst(false)
    return { ids: [first], body: {}, after: () => onlyFirst(false) }
  },
  'POST /api/forms/:id/restore': async () => {
    await onlyFirst(true)
    return { ids: [first], body: {}, after: () => onlyFirst(false) }
  },
}
