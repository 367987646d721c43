import { Router } from 'express'
import { allow } from '../middleware/allow.ts'
import { accessOf } from '../middleware/requestContext.ts'
import { handProfilePolicies } from '../policies/handProfile.ts'
import { presentHandProfile } from '../presenters/handProfile.ts'
import { findConsentedChild } from '../queries/childFacts.ts'
import { lockedHandEvidence } from '../queries/handEvidence.ts'
import { listMeasures } from '../queries/measures.ts'
import { listQuestionnaires } from '../queries/questionnaires.ts'
import { recordChildRead } from '../services/audit.ts'

export const handProfileRoutes = (): Router => {
  const router = Router()

  router.get('/children/:childId/hand-profile', allow(handProfilePolicies.read), async (req, res) => {
    const access = accessOf(req)
    const [questionnaires, measures, child] = await Promise.all([
      listQuestionnaires(access),
      listMeasures(access),
      findConsentedChild(access, 'assessment_treatment'),
    ])
    const recorded = recordChildRead(req.actor, access, 'handProfile.read', {
      detail: { ids: [...questionnaires, ...measures].map(({ id }) => id) },
    })
    const presented = async () => {
      const evidence = lockedHandEvidence(questionnaires, measures)
      return presentHandProfile({ questionnaires, measures, evidence, ...child }, access)
    }
    // The page is put together while its entry is on the way to the disk; the answer leaves once it is there.
    const [profile] = await Promise.all([presented(), recorded])
    res.json(profile)
  })

  return router
}
