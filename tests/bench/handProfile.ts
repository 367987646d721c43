import { randomUUID } from 'node:crypto'
import { createConnection } from 'mysql2/promise'
import { connectionOptions, type DatabaseAccess } from '../../server/setup/databaseAccess.ts'
import { methodVersions } from '../../shared/measureScores.ts'
import { answered, formNamed, measured, sidesDetails } from '../support/handEvidence.ts'
import { pegsDetails, reachingDetails } from '../support/measures.ts'

const days = ['2026-02-03', '2026-08-04']

const responsesOf = (day: string) =>
  (['hand-use-10', 'ten-task'] as const).flatMap((form) =>
    (['guardian', 'therapist'] as const).map((informant) =>
      answered('L L LL R L B L L N L', { form: formNamed(form), informant, answeredOn: day }),
    ),
  )

const measuresOf = (day: string) =>
  [
    reachingDetails((place) => (place > 5 ? 'right' : 'left')),
    pegsDetails([14, 14.4, 13.8], [16, 16.2, 15.6]),
    { ...pegsDetails([52, 54, 51], [44, 46, 43]), kind: 'tapping' as const },
    sidesDetails('right', 'left', 'right', 'left'),
  ].map((details) => measured(details as ReturnType<typeof pegsDetails>, { measuredOn: day }))

/** Two occasions of two forms by two informants and of four measures: sixteen records on one child's profile. */
export const fillHandProfile = async (access: DatabaseAccess, childId: string): Promise<void> => {
  const connection = await createConnection({ ...connectionOptions(access), timezone: 'Z' })
  const [rows] = await connection.query('SELECT therapistId FROM assignments WHERE childId = ? LIMIT 1', [
    childId,
  ])
  const [held] = rows as { therapistId: string }[]
  const at = new Date('2026-08-05T09:00:00Z')
  for (const response of days.flatMap(responsesOf))
    await connection.query('INSERT INTO questionnaire_responses SET ?', {
      id: randomUUID(),
      childId,
      formVersion: response.form.id,
      informant: response.informant,
      answeredOn: response.answeredOn,
      answers: JSON.stringify(response.answers),
      cutOffSet: response.score.cutOffs.id,
      score: JSON.stringify(response.score),
      lockedAt: at,
      lockedById: held?.therapistId,
      startedById: held?.therapistId,
      createdAt: at,
      version: 1,
    })
  for (const measure of days.flatMap(measuresOf))
    await connection.query('INSERT INTO measures SET ?', {
      id: randomUUID(),
      childId,
      kind: measure.details.kind,
      methodVersion: methodVersions[measure.details.kind],
      measuredOn: measure.measuredOn,
      details: JSON.stringify(measure.details),
      score: JSON.stringify(measure.score),
      startedById: held?.therapistId,
      lockedAt: at,
      lockedById: held?.therapistId,
      createdAt: at,
      version: 1,
    })
  await connection.query('ANALYZE TABLE questionnaire_responses, questionnaire_forms, measures')
  await connection.end()
}
