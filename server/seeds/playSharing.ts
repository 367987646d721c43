import { createTransport } from 'nodemailer'
import { IsNull } from 'typeorm'
import { addDays, type Day } from '../../shared/days.ts'
import type { LetterDraft } from '../../shared/letters.ts'
import { nextVisitSentence } from '../../shared/letterTemplates.ts'
import { database } from '../dataSource.ts'
import { Alert } from '../entities/Alert.ts'
import { findLetter } from '../queries/letters.ts'
import { findReceivedLetter } from '../queries/receivedLetters.ts'
import { SchoolAdvice } from '../entities/SchoolAdvice.ts'
import { Task } from '../entities/Task.ts'
import { actOnAlert } from '../services/alerts.ts'
import { replyToAdvice } from '../services/classes.ts'
import { approveLetter } from '../services/letterApproval.ts'
import { sendLetter } from '../services/letterSending.ts'
import { changeLetter, createProgressLetter, returnLetter, submitLetter } from '../services/letters.ts'
import { deliverDue } from '../services/outboxWorker.ts'
import { recordLetterRead } from '../services/receivedLetters.ts'
import { endAdvice, publishAdvice } from '../services/schoolAdvice.ts'
import { addTask, finishTask } from '../services/tasks.ts'
import { transact } from '../services/transact.ts'
import type {
  DemoAdvice,
  DemoAlertAction,
  DemoLetter,
  DemoLetterAct,
  DemoLetterText,
  DemoTask,
} from './demo/demoTypes.ts'
import type { StaffKey } from './demo/people.ts'
import { accepting, acting, childOf, idIn, storyOf, type Scene } from './playScene.ts'
import { actorOf } from './seedPeople.ts'

export const playAdvice = async (
  scene: Scene,
  number: number,
  { advice, demoToday }: { advice: DemoAdvice; demoToday: Day },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, advice.by)
  const items = advice.items.map(({ itemId, because }) => ({ itemId, because }))
  await publishAdvice(actor, access, { items, checkBy: addDays(demoToday, advice.checkByDay) }, null)
}

const liveAdvice = (childId: string, itemId: string) =>
  database().manager.findOneOrFail(SchoolAdvice, {
    where: { childId, itemId },
    order: { publishedAt: 'DESC' },
  })

export const playReply = async (
  scene: Scene,
  number: number,
  itemId: string,
  { answer, reason, by }: NonNullable<DemoAdvice['items'][number]['reply']>,
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const { id } = await liveAdvice(access.childId, itemId)
  await replyToAdvice(actor, access, id, { reply: answer, reason }, null)
}

export const playAdviceEnd = async (scene: Scene, number: number, advice: DemoAdvice): Promise<void> => {
  const { actor, access } = await acting(scene, number, advice.by)
  for (const { itemId } of advice.items)
    await endAdvice(actor, access, (await liveAdvice(access.childId, itemId)).id)
}

/** The author writes the date agreed for the next visit, which may not have stood on the record yet. */
const withDate = (text: string, { nextVisitDay }: DemoLetter, demoToday: Day): string => {
  if (nextVisitDay === null) return text
  const [, ...rest] = text.split('\n\n')
  return [nextVisitSentence(addDays(demoToday, nextVisitDay)), ...rest].join('\n\n')
}

/** Puts the author's wording in place of the assembled sections; null leaves a section out. */
const reworded = (
  assembled: LetterDraft,
  demo: DemoLetter,
  wording: DemoLetterText,
  demoToday: Day,
): LetterDraft => ({
  salutation: demo.salutation ?? assembled.salutation,
  nextVisitOn: demo.nextVisitDay === null ? null : addDays(demoToday, demo.nextVisitDay),
  sections: assembled.sections.flatMap((section) => {
    const text = wording[section.id]
    if (text === null) return []
    if (text === undefined && section.id === 'next')
      return [{ ...section, text: withDate(section.text, demo, demoToday) }]
    return [{ ...section, text: text ?? section.text }]
  }),
})

export const playLetter = async (
  scene: Scene,
  number: number,
  { letter, index, demoToday }: { letter: DemoLetter; index: number; demoToday: Day },
): Promise<void> => {
  const who = await acting(scene, number, letter.author)
  const id = await createProgressLetter(who.actor, who.access, null)
  storyOf(scene, number).letterIds.set(index, id)
  const { content } = await findLetter(who.access, id)
  for (const wording of [letter.firstWording, letter.wording]) {
    if (wording === null) continue
    const stored = await findLetter(who.access, id)
    const text = reworded(content, letter, wording, demoToday)
    await changeLetter(who.actor, who.access, stored, stored.version, text)
  }
}

const refusing = createTransport({
  name: 'refusing',
  version: '1',
  send: (_mail, done) => done(Object.assign(new Error('refused'), { responseCode: 550 })),
})

export const playLetterAct = async (
  scene: Scene,
  number: number,
  { act, index, author }: { act: DemoLetterAct; index: number; author: StaffKey },
): Promise<void> => {
  const story = storyOf(scene, number)
  const { actor, viewer, access } = await acting(scene, number, 'by' in act ? act.by : author)
  const letter = await findLetter(access, idIn(story.letterIds, index))
  switch (act.act) {
    case 'submit':
      return submitLetter(actor, access, letter, letter.version)
    case 'return':
      return returnLetter(actor, access, letter, letter.version, { reason: act.reason })
    case 'approve':
      return approveLetter(actor, access, letter, letter.version, { overrides: act.overrides })
    case 'send': {
      const guardianIds = act.carers.map((carer) => story.guardianIds[carer] ?? '')
      // Only this letter is refused: neither what waited before it nor what its author is told.
      if (act.outcome === 'failed') await deliverDue(accepting, scene.appUrl)
      await sendLetter(actor, access, letter, letter.version, guardianIds, scene.appUrl)
      if (act.outcome === 'failed') await deliverDue(refusing, scene.appUrl, guardianIds.length)
      if (act.outcome === 'queued' || act.outcome === 'cancelled') return holdBack(viewer.id)
      await deliverDue(accepting, scene.appUrl)
      if (act.outcome === 'opened')
        for (const carer of act.carers) await openLetter(scene, number, carer, letter.id)
    }
  }
}

/** Leaves this letter's e-mail waiting while the others of the story go out. */
const holdBack = async (enqueuedById: string): Promise<void> => {
  await database().query(
    `UPDATE outbox_messages SET nextAttemptAt = DATE_ADD(nextAttemptAt, INTERVAL 9 HOUR) WHERE state = 'queued' AND enqueuedById = ?`,
    [enqueuedById],
  )
}

const openLetter = async (scene: Scene, number: number, carer: number, letterId: string): Promise<void> => {
  const account = childOf(scene, number).carers[carer]?.account
  if (!account) return
  const actor = actorOf(scene.people, account)
  await recordLetterRead(actor, await findReceivedLetter(actor.viewer, letterId), 'text')
}

export const playAlertAction = async (
  scene: Scene,
  number: number,
  { flag, by, action }: { flag: DemoAlertAction['flag']; by: StaffKey; action: string },
): Promise<void> => {
  const { actor, access } = await acting(scene, number, by)
  const alert = await database().manager.findOneByOrFail(Alert, {
    childId: access.childId,
    flag,
    actedAt: IsNull(),
  })
  await actOnAlert(actor, access, alert.id, { action })
}

export const playTask = async (
  scene: Scene,
  number: number,
  { task, index, demoToday }: { task: DemoTask; index: number; demoToday: Day },
): Promise<void> => {
  const story = storyOf(scene, number)
  const id = await transact(actorOf(scene.people, 'ines'), async (tx, record) => {
    const taskId = await addTask(tx, {
      childId: story.childId,
      kind: task.kind,
      text: task.text,
      dueOn: addDays(demoToday, task.dueDay),
      assigneeId: task.assignee === null ? null : actorOf(scene.people, task.assignee).viewer.id,
      otherwise: task.forRole ?? 'clinicLead',
    })
    record({ action: 'task.added', objectType: 'task', objectId: taskId, childId: story.childId })
    return taskId
  })
  story.taskIds.set(index, id)
}

export const playTaskEnd = async (
  scene: Scene,
  number: number,
  index: number,
  by: StaffKey,
): Promise<void> => {
  const actor = actorOf(scene.people, by)
  await finishTask(actor, actor.viewer, idIn(storyOf(scene, number).taskIds, index))
}

export const playOwnTasksEnd = async (
  scene: Scene,
  number: number,
  kind: string,
  by: StaffKey,
): Promise<void> => {
  const actor = actorOf(scene.people, by)
  const { childId } = storyOf(scene, number)
  const open = await database().manager.findBy(Task, { childId, kind, doneAt: IsNull() })
  for (const { id } of open) await finishTask(actor, actor.viewer, id)
}
