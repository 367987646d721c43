import { createHash } from 'node:crypto'
import type { SampleDetails } from '../../shared/samples.ts'
import type { Actor } from '../access/actor.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { now } from '../clock.ts'
import { Sample } from '../entities/Sample.ts'
import { AppError, conflict, notFound, slowDown } from '../errors.ts'
import { bytesStoredFor, findSampleFile, uploadsBy, type SampleFile } from '../queries/samples.ts'
import { findForChild } from '../queries/scope.ts'
import { checkFile } from '../uploads/checkedFile.ts'
import type { ReceivedFile } from '../uploads/receiveUpload.ts'
import { recordChildRead, type AuditFact } from './audit.ts'
import { createOnce } from './once.ts'
import { requireConsent, requirePastDay } from './recordRules.ts'
import { transact } from './transact.ts'

const bytesForOneChild = 500 * 1024 * 1024
const filesADay = 100
const dayMs = 86_400_000

const fact = (access: ChildAccess, action: string, id: string): AuditFact => ({
  action: `sample.${action}`,
  objectType: 'sample',
  objectId: id,
  childId: access.childId,
  relation: access.relation,
})

const checkRoom = async (access: ChildAccess, coming: number): Promise<void> => {
  if ((await uploadsBy(access.viewer, new Date(now().getTime() - dayMs))) >= filesADay) throw slowDown(3600)
  if ((await bytesStoredFor(access)) + coming > bytesForOneChild) {
    const message = 'This child’s record holds 500 MB of pictures already. Tell the clinic lead.'
    throw new AppError(413, 'too_large', message, { fields: { file: message } })
  }
}

/**
 * Opens an upload and stores our re-encoding of it with its hash; the hash of the original goes into the audit trail.
 * The same key again makes no second sample. Answers the sample's id.
 */
export const addSample = async (
  actor: Actor,
  access: ChildAccess,
  details: SampleDetails,
  received: ReceivedFile,
  key: string | null,
): Promise<string> => {
  await requirePastDay(access, 'takenOn', 'The date of the writing', details.takenOn)
  await requireConsent(undefined, access, 'store_work_samples')
  await checkRoom(access, received.buffer.length)
  const file = await checkFile(received)
  const originalHash = file.originalSha256.toString('hex')
  return transact(actor, (tx, record) => {
    const request = ['sample', access.childId, originalHash, details]
    const factOf = (id: string) => ({ ...fact(access, 'added', id), detail: { originalHash } })
    return createOnce(tx, actor, record, { key, request }, factOf, async (sampleId) => {
      // Once more: consent may have been withdrawn while the file was being opened.
      await requireConsent(tx, access, 'store_work_samples')
      await tx.insert(Sample, {
        id: sampleId,
        childId: access.childId,
        takenOn: details.takenOn,
        details,
        contentType: file.contentType,
        bytes: file.content.length,
        width: file.width,
        height: file.height,
        pixelsPerMm: file.pixelsPerMm === null ? null : file.pixelsPerMm.toFixed(4),
        sha256: file.sha256,
        originalSha256: file.originalSha256,
        content: file.content,
        thumbnail: file.thumbnail,
        uploadedById: access.viewer.id,
        uploadedAt: now(),
        removedAt: null,
        removedById: null,
      })
    })
  })
}

/** The stored file, checked against its hash. A damaged one is never handed out: 409 `damaged` and an audit entry. */
export const readSampleFile = async (actor: Actor, access: ChildAccess, id: string): Promise<SampleFile> => {
  const file = await findSampleFile(access, id)
  const object = { objectType: 'sample', objectId: file.id }
  if (!createHash('sha256').update(file.content).digest().equals(file.sha256)) {
    await recordChildRead(actor, access, 'sample.damaged', object)
    throw conflict(
      'damaged',
      'This file was damaged in storage and is not shown. Tell the clinic lead: a backup may hold it.',
    )
  }
  await recordChildRead(actor, access, 'sample.file', object)
  return file
}

/** Takes a sample off the record's pages; its row and bytes stay in the database. */
export const removeSample = (actor: Actor, access: ChildAccess, id: string): Promise<void> =>
  transact(actor, async (tx, record) => {
    const sample = await findForChild(access, Sample, id, tx, { lock: true })
    if (sample.removedAt !== null) throw notFound()
    await tx.update(Sample, { id }, { removedAt: now(), removedById: access.viewer.id })
    record(fact(access, 'removed', id))
  })
