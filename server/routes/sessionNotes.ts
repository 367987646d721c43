import { Router, type Request } from 'express'
import { body } from '../../shared/fields.ts'
import { maximumPageSize } from '../../shared/pages.ts'
import { addendumSchema, noteDraftSchema, signNoteSchema } from '../../shared/sessionNotes.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf, pageOf, queryText } from '../middleware/requestBody.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { sessionNotePolicies } from '../policies/sessionNotes.ts'
import { presentPage } from '../presenters/pages.ts'
import { presentNote, presentNoteRow, presentRevision } from '../presenters/sessionNotes.ts'
import { findNote, listNotes, listRevisions } from '../queries/sessionNotes.ts'
import { recordChildRead } from '../services/audit.ts'
import { countersignNote, signNote } from '../services/noteSigning.ts'
import { addAddendum, createNote, discardNote, saveNote } from '../services/sessionNotes.ts'
import { answerStale } from '../services/versions.ts'

const base = '/children/:childId/session-notes'
const nothing = body({})

const idOf = (req: Request) => String(req.params.noteId)

const view = async (req: Request, id: string) => presentNote(await findNote(accessOf(req), id), accessOf(req))

const viewForReading = async (req: Request, id: string) => {
  const shown = await view(req, id)
  await recordChildRead(req.actor, accessOf(req), 'sessionNote.read', {
    objectType: 'sessionNote',
    objectId: id,
  })
  return shown
}

/** Texts are shown a hundred at a time unless the caller asks for pages of another size. */
const revisionPageOf = (req: Request) => {
  const request = pageOf(req)
  const size = queryText(req, 'size') === null ? maximumPageSize : request.size
  return { size, offset: (request.page - 1) * size }
}

export const sessionNoteRoutes = (): Router => {
  const router = Router()

  router.get(base, allow(sessionNotePolicies.list), async (req, res) => {
    const request = pageOf(req)
    const notes = await listNotes(accessOf(req), request)
    await recordChildRead(req.actor, accessOf(req), 'sessionNotes.list', {
      detail: { ids: notes.rows.map((row) => row.id) },
    })
    res.json(presentPage(notes, request, presentNoteRow))
  })

  router.post(base, allow(sessionNotePolicies.create), async (req, res) => {
    const draft = await bodyOf(req, noteDraftSchema)
    const id = await createNote(req.actor, accessOf(req), draft, idempotencyKeyOf(req))
    res.status(201).json(await view(req, id))
  })

  router.get(`${base}/:noteId`, allow(sessionNotePolicies.read), async (req, res) => {
    res.json(await viewForReading(req, idOf(req)))
  })

  router.put(`${base}/:noteId`, allow(sessionNotePolicies.change), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    const draft = await bodyOf(req, noteDraftSchema)
    const saved = await answerStale(saveNote(req.actor, accessOf(req), id, version, draft), () =>
      viewForReading(req, id),
    )
    res.json(presentNote(saved, accessOf(req)))
  })

  router.delete(`${base}/:noteId`, allow(sessionNotePolicies.discard), async (req, res) => {
    await discardNote(req.actor, accessOf(req), idOf(req))
    res.status(204).end()
  })

  router.get(`${base}/:noteId/revisions`, allow(sessionNotePolicies.revisions), async (req, res) => {
    const access = accessOf(req)
    const note = await findNote(access, idOf(req))
    const revisions = await listRevisions(access, note.id, revisionPageOf(req))
    await recordChildRead(req.actor, access, 'sessionNote.revisions', {
      objectType: 'sessionNote',
      objectId: note.id,
    })
    res.json(revisions.map(presentRevision))
  })

  router.post(`${base}/:noteId/sign`, allow(sessionNotePolicies.sign), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    const signature = await bodyOf(req, signNoteSchema)
    await answerStale(signNote(req.actor, accessOf(req), id, version, signature), () =>
      viewForReading(req, id),
    )
    res.json(await view(req, id))
  })

  router.post(`${base}/:noteId/countersign`, allow(sessionNotePolicies.countersign), async (req, res) => {
    const id = idOf(req)
    const version = ifMatchOf(req)
    await bodyOf(req, nothing)
    await answerStale(countersignNote(req.actor, accessOf(req), id, version), () => viewForReading(req, id))
    res.json(await view(req, id))
  })

  router.post(`${base}/:noteId/addenda`, allow(sessionNotePolicies.addAddendum), async (req, res) => {
    const id = idOf(req)
    const addendum = await bodyOf(req, addendumSchema)
    await addAddendum(req.actor, accessOf(req), id, addendum, idempotencyKeyOf(req))
    res.status(201).json(await view(req, id))
  })

  return router
}
