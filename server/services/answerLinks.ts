import type { AnswerDraft, AnswerLink } from '../../shared/answerRequests.ts'
import { addWorkingDays } from '../../shared/days.ts'
import type { Actor } from '../access/actor.ts'
import type { Tx } from '../dataSource.ts'
import { gone } from '../errors.ts'
import { findRequestOfLink, lockRequest, type AnswerableRequest } from '../queries/answerRequests.ts'
import { execute, selectOne } from '../queries/sql.ts'
import { hashToken } from './accounts.ts'
import { closeAnswers, keepAnswers, requestFact } from './answers.ts'
import { currentTherapist } from './assignments.ts'
import type { AuditFact } from './audit.ts'
import { clinicToday, readSettings } from './settings.ts'
import { addTask } from './tasks.ts'
import { countAttempt, countHit, forgiveHit, refuseWhileBlocked } from './throttles.ts'
import { transact } from './transact.ts'

/** What a link and a birth date come with, wherever they come from. */
export interface LinkCall {
  actor: Actor
  link: AnswerLink
  /** Network address of the caller. */
  address: string
}

const triesAMinute = 60

// One text for every reason, so that nobody learns whether a link was ever real or whose child it is about.
const linkEnded = () =>
  gone(
    'link_ended',
    'We could not open this. Please check the date of birth. If it is right, this link has been used, has been ' +
      'replaced by a newer e-mail, or is too old. Please call the clinic: they can send a new one.',
  )

// Somebody has the questions before them: the same words for every reason, and none about a date they gave already.
const answersRefused = () =>
  gone(
    'link_ended',
    'These questions are closed: they were sent or withdrawn, their time is over, a newer e-mail took their place, or ' +
      'somebody else has signed in in this browser. Please call the clinic: they can send a new link.',
  )

const wrongDatesPerTask = 10

/** Every tenth wrong date on one request, through whichever of its links, is for the therapist to look into. */
const countWrongDate = async (tx: Tx, { id, childId }: AnswerableRequest): Promise<void> => {
  await execute(tx, 'UPDATE answer_requests SET wrongDates = wrongDates + 1 WHERE id = :id', { id })
  const counted = await selectOne<{ wrongDates: number }>(
    'SELECT wrongDates FROM answer_requests WHERE id = :id',
    { id },
    tx,
  )
  if (counted === null || counted.wrongDates % wrongDatesPerTask !== 0) return
  await addTask(tx, {
    childId,
    kind: 'answer_link_guessed',
    text:
      'Somebody tried to open the link to the questions with a wrong date of birth ten times: ask the carer and ' +
      'send a new link',
    dueOn: addWorkingDays(clinicToday(await readSettings(tx)), 1),
    assigneeId: await currentTherapist(tx, childId),
    otherwise: 'clinicLead',
  })
}

/**
 * Runs one act on the request of a link, under its lock. Throws 410 alike for every link that is used, expired,
 * withdrawn, replaced or unknown, for a wrong birth date and for a browser in which somebody else is signed in. Wrong
 * dates are counted in the same transaction, so that parallel guesses cannot slip through. Right ones never count and
 * give none back: each save of the carer would otherwise hand somebody else who has the link five new guesses.
 */
const withLink = async <T>(
  { actor, link, address }: LinkCall,
  act: (tx: Tx, record: (fact: AuditFact) => void, request: AnswerableRequest) => Promise<T>,
  ended = answersRefused,
): Promise<T> => {
  const tokenHash = hashToken(link.token)
  const guesses = `answer-link:${tokenHash.toString('hex')}`
  await countHit(`answer-link-address:${address}`, triesAMinute, 60)
  const done = await transact(actor, async (tx, record) => {
    await lockRequest(tx, { tokenHash })
    const request = await findRequestOfLink(tokenHash, tx)
    const refuse = () => {
      record({
        ...(request && requestFact(request, 'answerLink.refused', null)),
        action: 'answerLink.refused',
        result: 'denied',
      })
      return null
    }
    if (!request?.open) return refuse()
    if (actor.viewer !== null && actor.viewer.id !== request.userId) return refuse()
    await refuseWhileBlocked(guesses, tx)
    if (link.birthDate !== request.birthDate) {
      await countAttempt(guesses, tx)
      await countWrongDate(tx, request)
      return refuse()
    }
    return { value: await act(tx, record, request) }
  })
  if (done === null) throw ended()
  await forgiveHit(`answer-link-address:${address}`)
  return done.value
}

/** The request behind a link; opening does not use it up. */
export const openLink = (call: LinkCall): Promise<AnswerableRequest> =>
  withLink(
    call,
    (_tx, record, request) => {
      record(requestFact(request, 'answerLink.opened', 'guardian'))
      return Promise.resolve(request)
    },
    linkEnded,
  )

/** Keeps answers given through a link. Throws StaleWrite when another device was quicker. */
export const saveByLink = async (
  call: LinkCall,
  given: { version: number; draft: AnswerDraft },
): Promise<AnswerableRequest> => {
  const settings = await readSettings()
  return withLink(call, async (tx, record, request) => {
    await keepAnswers(tx, record, request, { ...given, settings })
    record(requestFact(request, 'answerLink.saved', 'guardian'))
    return request
  })
}

/** Sends the answers; the link ends with it. */
export const sendByLink = async (call: LinkCall, version: number): Promise<void> => {
  const settings = await readSettings()
  await withLink(call, async (tx, record, request) => {
    await closeAnswers(tx, record, request, { version, settings })
    record(requestFact(request, 'answerLink.sent', 'guardian'))
  })
}
