import { Router } from 'express'
import { schoolClassSchema, schoolSchema } from '../../shared/schools.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, idempotencyKeyOf, ifMatchOf, pageOf, queryText } from '../middleware/requestBody.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { notFound } from '../errors.ts'
import { schoolPolicies } from '../policies/schools.ts'
import { presentPage } from '../presenters/pages.ts'
import { presentClassChoice, presentCurrentClass, presentSchool } from '../presenters/schools.ts'
import { findClass, findSchool, listClassChoices, listClassesOf, listSchools } from '../queries/schools.ts'
import { changeClass, createClass, createSchool } from '../services/schools.ts'
import { answerStale } from '../services/versions.ts'

export const schoolRoutes = (): Router => {
  const router = Router()

  router.get('/schools', allow(schoolPolicies.list), async (req, res) => {
    const viewer = viewerOf(req)
    const page = pageOf(req)
    const schools = await listSchools(queryText(req, 'search'), page)
    const classes = await listClassesOf(schools.rows.map((school) => school.id))
    res.json(presentPage(schools, page, (school) => presentSchool(school, classes, viewer)))
  })

  router.post('/schools', allow(schoolPolicies.create), async (req, res) => {
    const details = await bodyOf(req, schoolSchema)
    const school = await findSchool(await createSchool(req.actor, details, idempotencyKeyOf(req)))
    if (!school) throw notFound()
    res.status(201).json(presentSchool(school, [], viewerOf(req)))
  })

  router.get('/class-choices', allow(schoolPolicies.classChoices), async (_req, res) => {
    res.json((await listClassChoices()).map(presentClassChoice))
  })

  router.post('/classes', allow(schoolPolicies.createClass), async (req, res) => {
    const details = await bodyOf(req, schoolClassSchema)
    res.status(201).json({ id: await createClass(req.actor, details, idempotencyKeyOf(req)) })
  })

  router.put('/classes/:classId', allow(schoolPolicies.changeClass), async (req, res) => {
    const id = String(req.params.classId)
    const version = ifMatchOf(req)
    const details = await bodyOf(req, schoolClassSchema)
    await answerStale(changeClass(req.actor, id, version, details), async () => {
      const current = await findClass(id)
      if (!current) throw notFound()
      return presentCurrentClass(current)
    })
    res.json({ id })
  })

  return router
}
