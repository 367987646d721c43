import { randomUUID } from 'node:crypto'
import type { Transporter } from 'nodemailer'
import { systemActor } from '../access/actor.ts'
import { now } from '../clock.ts'
import { database, type Tx } from '../dataSource.ts'
import { OutboxMessage } from '../entities/OutboxMessage.ts'
import { User } from '../entities/User.ts'
import { logger } from '../logger.ts'
import { deliveryFailed, type DeliveryProblem } from '../mail/mailTemplates.ts'
import type { MailClinic } from '../mail/mailLayout.ts'
import { execute, selectOne } from '../queries/sql.ts'
import { reasonNotToAsk, tellRequestFailed } from './answerMail.ts'
import { sendDueReminders } from './answerReminders.ts'
import { reasonNotToDeliver, setDeliveryState } from './letterDeliveries.ts'
import { enqueueMail, forgetLink } from './outbox.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask, type NewTask } from './tasks.ts'
import { transact } from './transact.ts'

/** Longer than the ten minutes a server may take to answer the final dot (RFC 5321 §4.5.3.2), so no twin starts meanwhile. */
const leaseMinutes = 11
const giveUpDays = 5
const shortestWaitMinutes = 1
const longestWaitMinutes = 240

/** Minutes until the next try after the n-th one: 1, 4, 16, 64, then every 4 hours. */
export const retryMinutes = (attempts: number): number =>
  Math.min(shortestWaitMinutes * 4 ** (attempts - 1), longestWaitMinutes)

type Claimed = Pick<
  OutboxMessage,
  'id' | 'kind' | 'recipient' | 'attempts' | 'createdAt' | 'mime' | 'enqueuedById'
>

/** Takes one message that is due, or whose last sender died; nobody else gets it while the lease runs. */
const claim = async (owner: string): Promise<Claimed | null> => {
  const id = await database().transaction(async (tx) => {
    const due = await selectOne<{ id: string }>(
      `SELECT id FROM outbox_messages
       WHERE (state = 'queued' AND nextAttemptAt <= :now) OR (state = 'sending' AND leaseUntil <= :now)
       ORDER BY nextAttemptAt LIMIT 1 FOR UPDATE SKIP LOCKED`,
      { now: now() },
      tx,
    )
    if (!due) return null
    await execute(
      tx,
      `UPDATE outbox_messages SET state = 'sending', leaseOwner = :owner, leaseUntil = :until, attempts = attempts + 1,
         lastTriedAt = :now WHERE id = :id`,
      { owner, until: new Date(now().getTime() + leaseMinutes * 60_000), now: now(), id: due.id },
    )
    return due.id
  })
  if (id === null) return null
  return database().manager.findOneOrFail(OutboxMessage, {
    where: { id },
    select: {
      id: true,
      kind: true,
      recipient: true,
      attempts: true,
      createdAt: true,
      mime: true,
      enqueuedById: true,
    },
  })
}

/** A refusal for good (5xx); anything else may be better later. */
const isRefusal = (error: unknown) => {
  const { responseCode } = error as { responseCode?: number }
  return responseCode !== undefined && responseCode >= 500
}

/** What the server answered and what to do about it, without addresses or names. */
const problemText = (error: unknown) => {
  const { responseCode, code } = error as { responseCode?: number; code?: string }
  // EENVELOPE: turned down at the address. A later refusal is of the message, and the family cannot mend that.
  if (responseCode !== undefined && isRefusal(error) && code === 'EENVELOPE')
    return `The address was refused (${responseCode}): check it with the family`
  if (responseCode !== undefined) return `The mail server answered ${responseCode}`
  return `The mail server could not be reached or broke off (${code ?? 'no answer'})`
}

type Outcome =
  | { state: 'sent' }
  | { state: 'failed'; problem: string; why: DeliveryProblem }
  | { state: 'cancelled'; problem: string }
  | { state: 'queued'; problem: string; waitMinutes: number }

const outcomeOf = (message: Claimed, error: unknown): Outcome => {
  const problem = problemText(error)
  const age = now().getTime() - message.createdAt.getTime()
  if (isRefusal(error)) return { state: 'failed', problem, why: 'refused' }
  if (age >= giveUpDays * 86_400_000) return { state: 'failed', problem, why: 'gave_up' }
  // Spread a little, so that a queue does not come back all at once.
  return { state: 'queued', problem, waitMinutes: retryMinutes(message.attempts) * (1 + Math.random() * 0.1) }
}

/** What the author of a letter must do once its e-mail did not leave. */
const taskAfter: Partial<Record<Outcome['state'], Pick<NewTask, 'kind' | 'text'>>> = {
  failed: {
    kind: 'letter_failed',
    text: 'A letter could not be delivered: check the address with the family',
  },
  cancelled: { kind: 'letter_cancelled', text: 'A queued letter was not sent: see why on the letter' },
}

interface LetterUnderWay {
  id: string
  letterId: string
  childId: string
  authorId: string
}

/** Tells the author that their letter did not arrive, in the transaction that says so. Nobody without an account. */
const tellAuthor = async (
  tx: Tx,
  { letterId, childId, authorId }: LetterUnderWay,
  { clinic, appUrl, why }: { clinic: MailClinic; appUrl: string; why: DeliveryProblem },
): Promise<void> => {
  const author = await tx.findOneByOrFail(User, { id: authorId })
  if (author.disabledAt !== null) return
  const content = deliveryFailed({
    clinic,
    link: `${appUrl}/children/${childId}/letters/${letterId}`,
    problem: why,
  })
  await enqueueMail(tx, { kind: 'delivery_failed', recipient: author.email, ...content }, null)
}

const settle = async (message: Claimed, owner: string, outcome: Outcome, appUrl: string): Promise<void> => {
  const settings = await readSettings()
  await transact(systemActor(`outbox-${message.id}`), async (tx, record) => {
    const changed = await execute(
      tx,
      `UPDATE outbox_messages SET state = :state, leaseOwner = NULL, leaseUntil = NULL, problem = :problem,
         nextAttemptAt = :next, sentAt = :sentAt${outcome.state === 'queued' ? '' : `, ${forgetLink}`} WHERE id = :id AND leaseOwner = :owner`,
      {
        state: outcome.state,
        problem: outcome.state === 'sent' ? null : outcome.problem,
        next: new Date(now().getTime() + (outcome.state === 'queued' ? outcome.waitMinutes * 60_000 : 0)),
        sentAt: outcome.state === 'sent' ? now() : null,
        id: message.id,
        owner,
      },
    )
    record({
      action: `mail.${outcome.state}`,
      objectType: 'outboxMessage',
      objectId: message.id,
      detail: { attempts: message.attempts },
    })
    if (changed === 0) return
    if (message.kind === 'answer_request' && outcome.state === 'failed')
      await tellRequestFailed(tx, message.id, clinicToday(settings))
    if (message.kind !== 'letter') return
    const delivery = await selectOne<LetterUnderWay>(
      `SELECT d.id, d.letterId, l.childId, l.authorId FROM letter_deliveries d JOIN letters l ON l.id = d.letterId
       WHERE d.outboxMessageId = :id`,
      { id: message.id },
      tx,
    )
    if (!delivery) return
    await setDeliveryState(tx, delivery.id, outcome.state)
    const task = taskAfter[outcome.state]
    if (task)
      await addTask(tx, {
        ...task,
        childId: delivery.childId,
        dueOn: clinicToday(settings),
        assigneeId: delivery.authorId,
        otherwise: 'clinicLead',
      })
    if (outcome.state === 'failed')
      await tellAuthor(tx, delivery, { clinic: settings, appUrl, why: outcome.why })
  })
}

/** Why a message must not leave after all, in words; null when it may. Judged at the moment of sending. */
const reasonToKeep = (message: Claimed): Promise<string | null> | null => {
  if (message.kind === 'letter') return reasonNotToDeliver(message.id)
  return message.kind === 'answer_request' ? reasonNotToAsk(message) : null
}

/**
 * Sends what is due, one message after the other, until nothing is; answers how many were tried. At least once: when
 * the answer to the final dot is lost the same bytes go again under the same Message-ID. One bad message never holds
 * up the next. `appUrl` is where the author of a letter that failed finds it.
 */
export const deliverDue = async (
  transport: Transporter,
  appUrl: string,
  mostMessages = 100,
): Promise<number> => {
  const owner = randomUUID()
  for (let tried = 0; tried < mostMessages; tried += 1) {
    const message = await claim(owner)
    if (!message) return tried
    const forbidden = await reasonToKeep(message)
    if (forbidden !== null) {
      await settle(message, owner, { state: 'cancelled', problem: forbidden }, appUrl)
      continue
    }
    const outcome = await transport
      .sendMail({ envelope: { from: senderOf(message.mime), to: [message.recipient] }, raw: message.mime })
      .then(
        (): Outcome => ({ state: 'sent' }),
        (error: unknown) => outcomeOf(message, error),
      )
    await settle(message, owner, outcome, appUrl)
  }
  return mostMessages
}

const senderOf = (mime: Buffer) => /^From:.*<([^>\r\n]+)>/im.exec(mime.toString('latin1', 0, 4000))?.[1] ?? ''

/** Rounds of the worker between two looks for reminders that are due. */
const roundsPerReminders = 30

/** Looks for due reminders and mail every few seconds until stopped; waits for the message under way. */
export const startOutboxWorker = (
  transport: Transporter,
  appUrl: string,
  everySeconds = 2,
): { stop: () => Promise<void> } => {
  let stopped = false
  let timer: NodeJS.Timeout | undefined
  let running: Promise<void> = Promise.resolve()
  let round = 0
  const work = async () => {
    if (round % roundsPerReminders === 0) await sendDueReminders(appUrl)
    round += 1
    await deliverDue(transport, appUrl)
  }
  const tick = () => {
    running = work()
      .then(
        () => undefined,
        (error: unknown) =>
          logger.warn({ code: (error as { code?: string }).code }, 'the outbox could not be worked on'),
      )
      .then(() => {
        if (!stopped) timer = setTimeout(tick, everySeconds * 1000)
      })
  }
  tick()
  return {
    stop: async () => {
      stopped = true
      clearTimeout(timer)
      await running
    },
  }
}
