import { Router, type Request } from 'express'
import { body } from '../../shared/fields.ts'
import { formEditionSchema } from '../../shared/formEditions.ts'
import { notFound } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf } from '../middleware/requestBody.ts'
import { formPolicies } from '../policies/forms.ts'
import { presentForm } from '../presenters/forms.ts'
import { findForm, listForms } from '../queries/forms.ts'
import { makeEdition, restoreForm, retireForm } from '../services/forms.ts'

const nothing = body({})

const idOf = (req: Request) => String(req.params.formId)

const shown = async (id: string) => {
  const form = await findForm(id)
  if (!form) throw notFound()
  return presentForm(form)
}

export const formRoutes = (): Router => {
  const router = Router()

  // A dozen editions at most, wanted whole wherever a form is chosen: the one list that has no pages.
  router.get('/forms', allow(formPolicies.list), async (_req, res) => {
    res.json((await listForms()).map(presentForm))
  })

  router.post('/forms', allow(formPolicies.makeEdition), async (req, res) => {
    const id = await makeEdition(req.actor, await bodyOf(req, formEditionSchema))
    res.status(201).json(await shown(id))
  })

  router.post('/forms/:formId/retire', allow(formPolicies.retire), async (req, res) => {
    await bodyOf(req, nothing)
    await retireForm(req.actor, idOf(req))
    res.json(await shown(idOf(req)))
  })

  router.post('/forms/:formId/restore', allow(formPolicies.restore), async (req, res) => {
    await bodyOf(req, nothing)
    await restoreForm(req.actor, idOf(req))
    res.json(await shown(idOf(req)))
  })

  return router
}
