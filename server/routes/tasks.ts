import { Router } from 'express'
import { emptySchema } from '../../shared/fields.ts'
import { allow } from '../middleware/allow.ts'
import { bodyOf } from '../middleware/requestBody.ts'
import { viewerOf } from '../middleware/requestContext.ts'
import { taskPolicies } from '../policies/tasks.ts'
import { finishTask } from '../services/tasks.ts'

export const taskRoutes = (): Router => {
  const router = Router()

  router.post('/tasks/:taskId/finish', allow(taskPolicies.finish), async (req, res) => {
    await bodyOf(req, emptySchema)
    await finishTask(req.actor, viewerOf(req), String(req.params.taskId))
    res.status(204).end()
  })

  return router
}
