import { Router, type Request } from 'express'
import { caseloadFilters, caseloadNeedKinds, caseloadSorts } from '../../shared/caseload.ts'
import { momentOf } from '../../shared/clinicTime.ts'
import { addDays } from '../../shared/days.ts'
import { episodeStates } from '../../shared/episodes.ts'
import { isId } from '../../shared/fields.ts'
import { now } from '../clock.ts'
import { invalid } from '../errors.ts'
import { allow } from '../middleware/allow.ts'
import { pageOf, queryChoice, queryText } from '../middleware/requestBody.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { caseloadPolicies } from '../policies/caseload.ts'
import { presentCaseloadRow } from '../presenters/caseload.ts'
import { presentPage } from '../presenters/pages.ts'
import { listCaseload } from '../queries/caseload.ts'
import { lastNoticeDay } from '../queries/caseloadNeeds.ts'
import { recordAudit } from '../services/audit.ts'
import { clinicToday, readSettings } from '../services/settings.ts'

const therapistOf = (req: Request): string | null => {
  const value = queryText(req, 'therapistId')
  if (value !== null && value !== 'none' && !isId(value))
    throw invalid({ therapistId: 'This therapist is not known' })
  return value
}

export const caseloadRoutes = (): Router => {
  const router = Router()

  router.get('/caseload', allow(caseloadPolicies.list), async (req, res) => {
    const page = pageOf(req)
    const request = {
      ...page,
      sort: queryChoice(req, 'sort', caseloadSorts) ?? 'name',
      direction: queryChoice(req, 'direction', ['asc', 'desc']) ?? 'asc',
      search: queryText(req, 'search'),
      state: queryChoice(req, 'state', episodeStates),
      show: queryChoice(req, 'show', caseloadFilters) ?? 'open',
      need: queryChoice(req, 'need', caseloadNeedKinds),
      therapistId: therapistOf(req),
    }
    const settings = await readSettings()
    const today = clinicToday(settings)
    const consentNotice = momentOf(addDays(lastNoticeDay(today), 1), '00:00', settings.timeZone)
    const children = await listCaseload(viewerOf(req), request, {
      today,
      waitTargetWeeks: settings.waitTargetWeeks,
      consentNotice,
    })
    await recordAudit(req.actor, {
      action: 'caseload.listed',
      detail: { ids: children.rows.map((row) => row.id) },
    })
    const rules = { ...settings, today, now: now() }
    res.json(presentPage(children, page, (row) => presentCaseloadRow(row, rules)))
  })

  return router
}
