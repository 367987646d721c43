import { emptyConclusion, type ConclusionContent, type ConclusionStart } from '../../shared/conclusions.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import type { Tx } from '../dataSource.ts'
import { Conclusion } from '../entities/Conclusion.ts'
import { conflict, invalid } from '../errors.ts'
import { listEvidence } from '../queries/conclusionEvidence.ts'
import { findConclusion, type ConclusionRecord } from '../queries/conclusions.ts'
import { lockChild } from '../queries/lockChild.ts'
import { findForChild } from '../queries/scope.ts'
import { selectOne } from '../queries/sql.ts'
import type { AuditFact } from './audit.ts'
import { chosenEvidence } from './conclusionEvidence.ts'
import { createOnce } from './once.ts'
import { transact } from './transact.ts'
import { StaleWrite, updateIfCurrent } from './versions.ts'

export const conclusionFact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `conclusion.${action}`,
  objectType: 'conclusion',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

/** The draft for writing, held until the transaction ends. Signed ones are refused here and by a trigger. */
export const openConclusion = async (tx: Tx, access: ChildAccess, id: string): Promise<Conclusion> => {
  const conclusion = await findForChild(access, Conclusion, id, tx, { lock: true })
  if (conclusion.state !== 'draft')
    throw conflict(
      'closed',
      'This conclusion is signed and stays as it is. To put something right, begin a new one that replaces it.',
    )
  return conclusion
}

/** Refuses (422) evidence that is not a locked or signed thing of this child; says nothing about what else it may be. */
export const requireEvidence = async (
  tx: Tx,
  access: ChildAccess,
  { evidence }: Pick<ConclusionContent, 'evidence'>,
) => {
  if (evidence.length === 0) return []
  const found = chosenEvidence(await listEvidence(access, tx), evidence)
  if (found === null)
    throw invalid({
      evidence:
        'A piece of evidence is not on this record, or is not signed or sent. Choose the evidence again.',
    })
  return found
}

const withoutRepeats = (content: ConclusionContent): ConclusionContent => ({
  ...content,
  evidence: content.evidence.filter(
    (link, index) =>
      content.evidence.findIndex(({ kind, id }) => kind === link.kind && id === link.id) === index,
  ),
})

/** The text a new draft starts with: empty, or that of the signed conclusion which it replaces. */
const firstContent = async (
  tx: Tx,
  access: ChildAccess,
  replacesId: string | null,
): Promise<ConclusionContent> => {
  if (replacesId === null) return emptyConclusion
  const earlier = await findForChild(access, Conclusion, replacesId, tx, { lock: true })
  if (earlier.state !== 'signed')
    throw conflict('not_signed', 'Only a signed conclusion is replaced. This one is not signed yet.')
  // A locking read: the newest row counts, not the one this transaction saw first.
  const newer = await selectOne<{ id: string }>(
    'SELECT id FROM conclusions WHERE replacesId = :replacesId FOR UPDATE',
    { replacesId },
    tx,
  )
  if (newer) throw conflict('duplicate', 'A newer conclusion took the place of this one. Replace that one.')
  return earlier.content
}

/** Begins a conclusion; a child has one draft at a time. Answers its id. */
export const startConclusion = (
  actor: Actor,
  access: ChildAccess,
  start: ConclusionStart,
  key: string | null,
): Promise<string> =>
  transact(actor, (tx, record) => {
    const replacesId = start.replacesId ?? null
    const request = ['conclusion', access.childId, replacesId]
    const factOf = (id: string) => conclusionFact(access, 'started', id)
    return createOnce(tx, actor, record, { key, request }, factOf, async (newId) => {
      await lockChild(access, tx)
      const open = await selectOne<{ id: string }>(
        "SELECT id FROM conclusions WHERE childId = :childId AND state = 'draft' LIMIT 1 FOR UPDATE",
        { childId: access.childId },
        tx,
      )
      if (open)
        throw conflict('duplicate', 'A conclusion is being written already. Go on with that one.', {
          id: open.id,
        })
      await tx.insert(Conclusion, {
        id: newId,
        childId: access.childId,
        authorId: access.viewer.id,
        state: 'draft',
        content: await firstContent(tx, access, replacesId),
        evidence: null,
        signedAt: null,
        countersignedAt: null,
        countersignedById: null,
        replacesId,
        createdAt: now(),
      })
    })
  })

/** Saves the draft and answers it as this save left it. Throws StaleWrite when somebody saved in between. */
export const saveConclusion = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
  given: ConclusionContent,
): Promise<ConclusionRecord> =>
  transact(actor, async (tx, record) => {
    await openConclusion(tx, access, id)
    const content = withoutRepeats(given)
    await requireEvidence(tx, access, content)
    await updateIfCurrent(tx, Conclusion, id, version, { content })
    record(conclusionFact(access, 'changed', id))
    return findConclusion(access, id, tx)
  })

/** Removes a draft that was begun and never signed. Throws StaleWrite when somebody wrote in it in between. */
export const discardConclusion = (
  actor: Actor,
  access: ChildAccess,
  id: string,
  version: number,
): Promise<void> =>
  transact(actor, async (tx, record) => {
    const draft = await openConclusion(tx, access, id)
    if (draft.version !== version) throw new StaleWrite()
    await tx.delete(Conclusion, id)
    record(conclusionFact(access, 'discarded', id))
  })
