import { addDays, type Day } from '../../shared/days.ts'
import type { AnswerDraft } from '../../shared/answerRequests.ts'
import { cutOffSets } from '../../shared/handUse.ts'
import { database } from '../dataSource.ts'
import { History } from '../entities/History.ts'
import { QuestionnaireResponse } from '../entities/QuestionnaireResponse.ts'
import { sendDueReminders } from '../services/answerReminders.ts'
import { askForAnswers } from '../services/answerRequests.ts'
import { saveOwnAnswers, sendOwnAnswers } from '../services/answers.ts'
import { changeHistory, closeHistory, startHistory } from '../services/histories.ts'
import { deliverDue } from '../services/outboxWorker.ts'
import { lockQuestionnaire, saveQuestionnaire, startQuestionnaire } from '../services/questionnaires.ts'
import type { DemoHistory, DemoRequest } from './demo/assessmentTypes.ts'
import type { ActorKey, Asked, DemoQuestionnaire } from './demo/demoTypes.ts'
import { accepting, acting, childOf, idIn, storyOf, type Scene } from './playScene.ts'
import { actorOf } from './seedPeople.ts'

export const playAsking = async (
  scene: Scene,
  number: number,
  { request, key }: { request: Omit<DemoRequest, 'child' | 'askedDay' | 'remindedDays'>; key: string },
): Promise<void> => {
  const story = storyOf(scene, number)
  const { actor, access } = await acting(scene, number, request.by)
  const { asks, formId, of, byLink } = request
  const asked =
    typeof of === 'number'
      ? { answerer: 'guardian' as const, guardianId: story.guardianIds[of] ?? null, teacherId: null }
      : { answerer: 'teacher' as const, guardianId: null, teacherId: actorOf(scene.people, of).viewer.id }
  // In the scenario the clinic asked the carer for the address before it sent a link.
  const details = { asks, formId, byLink, addressConfirmed: byLink, ...asked }
  story.requestIds.set(key, await askForAnswers(actor, access, details, { key: null, appUrl: scene.appUrl }))
  await deliverDue(accepting, scene.appUrl)
}

export const playReminders = async (scene: Scene): Promise<void> => {
  await sendDueReminders(scene.appUrl)
  await deliverDue(accepting, scene.appUrl)
}

/** The account of the one who was asked. */
const answererOf = (scene: Scene, number: number, asked: Asked): ActorKey => {
  if (typeof asked !== 'number') return asked
  const account = childOf(scene, number).carers[asked]?.account
  if (!account) throw new Error(`Child ${number}: the carer who was asked does not sign in`)
  return account
}

/** The one who was asked saves the answers, and sends them unless they are to stay unfinished. */
const answerAsAsked = async (
  scene: Scene,
  number: number,
  { key, of, draft, sent }: { key: string; of: Asked; draft: AnswerDraft; sent: boolean },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, answererOf(scene, number, of))
  const requestId = idIn(storyOf(scene, number).requestIds, key)
  await saveOwnAnswers(actor, access, requestId, { version: 0, draft })
  if (!sent) return
  const entity = draft.history === undefined ? QuestionnaireResponse : History
  const { version } = await database().manager.findOneByOrFail(entity, { requestId })
  await sendOwnAnswers(actor, access, requestId, version)
}

export const playQuestionnaire = async (
  scene: Scene,
  number: number,
  { questionnaire, key, on }: { questionnaire: DemoQuestionnaire; key: string | null; on: Day },
): Promise<void> => {
  const { formId, informant, respondentName, by, asked, answers, comment, locked } = questionnaire
  if (key !== null && asked !== null)
    return answerAsAsked(scene, number, { key, of: asked.of, draft: { answers, comment }, sent: locked })
  const { actor, access } = await acting(scene, number, by)
  const start = { formId, informant, respondentName, answeredOn: on, replacesId: null }
  const id = await startQuestionnaire(actor, access, start, null)
  const { version, cutOffSet } = await database().manager.findOneByOrFail(QuestionnaireResponse, { id })
  const cutOffs = cutOffSets.find((set) => set.id === cutOffSet)
  if (!cutOffs) throw new Error(`The response was begun with unknown cut-offs (${cutOffSet})`)
  const draft = { informant, respondentName, answeredOn: on, answers, comment, cutOffSet: cutOffs.id }
  const saved = await saveQuestionnaire(actor, access, id, version, draft)
  if (locked) await lockQuestionnaire(actor, access, id, saved.version)
}

export const playHistory = async (
  scene: Scene,
  number: number,
  { history, key, on, demoToday }: { history: DemoHistory; key: string | null; on: Day; demoToday: Day },
): Promise<void> => {
  const day = (offset: number | null) => (offset === null ? null : addDays(demoToday, offset))
  const details = {
    ...history.details,
    handChangedOn: day(history.handChangedDay),
    injuryOn: day(history.injuryDay),
  }
  if (key !== null)
    return answerAsAsked(scene, number, { key, of: history.carer, draft: { history: details }, sent: true })
  const { actor, access } = await acting(scene, number, history.by)
  const respondentName = childOf(scene, number).carers[history.carer]?.name ?? null
  const start = { respondentName, answeredOn: on, replacesId: null }
  const id = await startHistory(actor, access, start, null)
  const { version } = await database().manager.findOneByOrFail(History, { id })
  const saved = await changeHistory(actor, access, id, version, { respondentName, answeredOn: on, details })
  await closeHistory(actor, access, id, saved.version)
}
