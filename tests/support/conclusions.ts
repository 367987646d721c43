import { randomUUID } from 'node:crypto'
import type { ConclusionContent, ConclusionState } from '../../shared/conclusions.ts'
import { now } from '../../server/clock.ts'
import { database } from '../../server/dataSource.ts'
import type { Child } from '../../server/entities/Child.ts'
import { Conclusion } from '../../server/entities/Conclusion.ts'
import type { User } from '../../server/entities/User.ts'
import { insertRow } from './insertRow.ts'
import { reportContent, reportForPrint } from './reports.ts'

/** A conclusion in one of its states, written as the app account writes it. */
export const buildConclusion = (
  child: Pick<Child, 'id'>,
  author: Pick<User, 'id'>,
  state: ConclusionState,
  content: Partial<ConclusionContent> = {},
): Promise<Conclusion> =>
  insertRow(Conclusion, {
    id: randomUUID(),
    childId: child.id,
    authorId: author.id,
    state,
    content: reportContent(content),
    evidence: state === 'draft' ? null : reportForPrint().evidence,
    signedAt: state === 'draft' ? null : now(),
    countersignedAt: null,
    countersignedById: null,
    replacesId: null,
    createdAt: now(),
  })

/** Takes away what is begun for a child and not closed, so that a conclusion can be begun or signed. */
export const clearBegun = async (child: Pick<Child, 'id'>): Promise<void> => {
  await database().query("DELETE FROM conclusions WHERE childId = ? AND state = 'draft'", [child.id])
  for (const table of ['questionnaire_responses', 'measures'])
    await database().query(`DELETE FROM ${table} WHERE childId = ? AND lockedAt IS NULL`, [child.id])
}
