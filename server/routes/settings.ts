import { Router } from 'express'
import { settingsSchema } from '../../shared/settings.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf, ifMatchOf } from '../middleware/requestBody.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { settingsPolicies } from '../policies/settings.ts'
import { presentSettings } from '../presenters/settings.ts'
import { changeSettings, readSettingsRow } from '../services/settings.ts'
import { answerStale } from '../services/versions.ts'

export const settingsRoutes = (): Router => {
  const router = Router()

  router.get('/settings', allow(settingsPolicies.read), async (req, res) => {
    res.json(presentSettings(await readSettingsRow(), viewerOf(req)))
  })

  router.put('/settings', allow(settingsPolicies.change), async (req, res) => {
    const show = async () => presentSettings(await readSettingsRow(), viewerOf(req))
    await answerStale(changeSettings(req.actor, await bodyOf(req, settingsSchema), ifMatchOf(req)), show)
    res.json(await show())
  })

  return router
}
