import type { FormDefinition } from '../../shared/forms.ts'
import type { Tx } from '../dataSource.ts'
import { fromJson, selectOne, selectRows } from './sql.ts'

export interface FormRecord {
  id: string
  key: string
  edition: number
  definition: FormDefinition
  retiredAt: Date | null
}

type StoredForm = Omit<FormRecord, 'definition'> & { definition: string }

const toRecord = (row: StoredForm): FormRecord => ({
  ...row,
  definition: fromJson<FormDefinition>(row.definition),
})

const columns = 'f.id, f.formKey AS `key`, f.edition, f.definition, f.retiredAt'

/** Every edition, in use and retired: form by form, the newest edition first. */
export const listForms = async (tx?: Tx): Promise<FormRecord[]> => {
  const rows = await selectRows<StoredForm>(
    `SELECT ${columns} FROM questionnaire_forms f ORDER BY f.formKey, f.edition DESC`,
    {},
    tx,
  )
  return rows.map(toRecord)
}

// The database takes 'A' for 'a' and 'a ' for 'a'; a name that differs at all is another name.

/** One edition; null when there is none of exactly that name. */
export const findForm = async (id: string, tx?: Tx): Promise<FormRecord | null> => {
  const row = await selectOne<StoredForm>(
    `SELECT ${columns} FROM questionnaire_forms f WHERE f.id = :id`,
    { id },
    tx,
  )
  return row?.id === id ? toRecord(row) : null
}

/** Every edition of a form, the newest first, held until the transaction ends. */
export const lockEditions = async (key: string, tx: Tx): Promise<FormRecord[]> => {
  const rows = await selectRows<StoredForm>(
    `SELECT ${columns} FROM questionnaire_forms f WHERE f.formKey = :key ORDER BY f.edition DESC FOR UPDATE`,
    { key },
    tx,
  )
  return rows.filter((row) => row.key === key).map(toRecord)
}
