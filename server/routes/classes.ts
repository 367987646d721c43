import { Router, type Request } from 'express'
import { adviceReplySchema, type AdviceReplyGiven } from '../../shared/schoolAdvice.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, pageOf } from '../middleware/requestBody.ts'
import { accessOf, viewerOf } from '../middleware/requestContext.ts'
import { classPolicies } from '../policies/classes.ts'
import { presentOwnClass, presentPupil, presentPupilRow } from '../presenters/classes.ts'
import { presentPage } from '../presenters/pages.ts'
import { findPupil, listOwnClasses, listPupilAdvice, listPupilGoals, listPupils } from '../queries/classes.ts'
import { recordAudit, recordChildRead } from '../services/audit.ts'
import { replyToAdvice } from '../services/classes.ts'
import { readSettings } from '../services/settings.ts'

const pupilView = async (req: Request) => {
  const access = accessOf(req)
  const pupil = await findPupil(access)
  const [advice, goals, { timeZone }] = await Promise.all([
    listPupilAdvice(access),
    listPupilGoals(access),
    readSettings(),
  ])
  return presentPupil(pupil, { advice, goals }, access, timeZone)
}

/** A teacher's side: own classes, the pupils whose families share something, and answers to advice. */
export const classRoutes = (): Router => {
  const router = Router()

  router.get('/classes', allow(classPolicies.list), async (req, res) => {
    const classes = await listOwnClasses(viewerOf(req))
    await recordAudit(req.actor, {
      action: 'classes.list',
      relation: 'teacher',
      detail: { ids: classes.map((row) => row.id) },
    })
    res.json(classes.map(presentOwnClass))
  })

  router.get('/classes/:classId/pupils', allow(classPolicies.pupils), async (req, res) => {
    const request = pageOf(req)
    const pupils = await listPupils(viewerOf(req), String(req.params.classId), request)
    const { timeZone } = await readSettings()
    await recordAudit(req.actor, {
      action: 'classes.pupils',
      relation: 'teacher',
      objectType: 'schoolClass',
      objectId: String(req.params.classId),
      detail: { ids: pupils.rows.map((row) => row.id) },
    })
    res.json(presentPage(pupils, request, (row) => presentPupilRow(row, timeZone)))
  })

  router.get('/pupils/:childId', allow(classPolicies.pupil), async (req, res) => {
    const view = await pupilView(req)
    await recordChildRead(req.actor, accessOf(req), 'pupil.read', {
      detail: { ids: view.advice.map((advice) => advice.id) },
    })
    res.json(view)
  })

  router.post('/pupils/:childId/advice/:adviceId/replies', allow(classPolicies.reply), async (req, res) => {
    const given: AdviceReplyGiven = await bodyOf(req, adviceReplySchema)
    const adviceId = String(req.params.adviceId)
    await replyToAdvice(req.actor, accessOf(req), adviceId, given, idempotencyKeyOf(req))
    res.json(await pupilView(req))
  })

  return router
}
