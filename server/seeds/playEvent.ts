import type { Day } from '../../shared/days.ts'
import type { DemoEvent } from './demo/timelineTypes.ts'
import { playAsking, playHistory, playQuestionnaire, playReminders } from './playAnswers.ts'
import {
  playAcceptance,
  playAllocation,
  playCare,
  playConsent,
  playReferral,
  playStep,
  playWithdrawal,
} from './playCare.ts'
import { playConclusion, playSecondSignature } from './playConclusions.ts'
import {
  playGoal,
  playGoalEnd,
  playObservation,
  playRating,
  playSample,
  playSampleRemoval,
} from './playFindings.ts'
import { playMeasure } from './playMeasures.ts'
import { playAddendum, playCountersignature, playNote, playSignature } from './playNotes.ts'
import type { Scene } from './playScene.ts'
import {
  playAdvice,
  playAdviceEnd,
  playAlertAction,
  playLetter,
  playLetterAct,
  playOwnTasksEnd,
  playReply,
  playTask,
  playTaskEnd,
} from './playSharing.ts'

/** Carries one event of the demo out through the services of the product. The clock stands at the event's moment. */
export const playEvent = (scene: Scene, event: DemoEvent, demoToday: Day): Promise<void> => {
  const { child, on } = event
  switch (event.kind) {
    case 'referral':
      return playReferral(scene, child, { ...event, demoToday })
    case 'accept':
      return playAcceptance(scene, child, event.step)
    case 'allocate':
      return playAllocation(scene, child, event.therapist, event.by)
    case 'step':
      return playStep(scene, child, event.step)
    case 'care':
      return playCare(scene, child, event.by, demoToday)
    case 'consent':
      return playConsent(scene, child, { ...event, demoToday })
    case 'withdraw':
      return playWithdrawal(scene, child, event)
    case 'questionnaire':
      return playQuestionnaire(scene, child, event)
    case 'ask':
      return playAsking(scene, child, event)
    case 'remind':
      return playReminders(scene)
    case 'history':
      return playHistory(scene, child, { ...event, demoToday })
    case 'measure':
      return playMeasure(scene, child, event.measure, on)
    case 'conclusion':
      return playConclusion(scene, child, event.conclusion, event.index)
    case 'countersign_conclusion':
      return playSecondSignature(scene, child, event.index, event.by)
    case 'observation':
      return playObservation(scene, child, event.observation, on)
    case 'sample':
      return playSample(scene, child, event)
    case 'remove_sample':
      return playSampleRemoval(scene, child, event.index, event.by)
    case 'goal':
      return playGoal(scene, child, { ...event, demoToday })
    case 'rating':
      return playRating(scene, child, event)
    case 'end_goal':
      return playGoalEnd(scene, child, event)
    case 'note':
      return playNote(scene, child, event)
    case 'sign':
      return playSignature(scene, child, event)
    case 'countersign':
      return playCountersignature(scene, child, event.index, event.by)
    case 'addendum':
      return playAddendum(scene, child, event)
    case 'advice':
      return playAdvice(scene, child, { ...event, demoToday })
    case 'reply':
      return playReply(scene, child, event.itemId, event.reply)
    case 'end_advice':
      return playAdviceEnd(scene, child, event.advice)
    case 'letter':
      return playLetter(scene, child, { ...event, demoToday })
    case 'letter_act':
      return playLetterAct(scene, child, event)
    case 'act_on_alert':
      return playAlertAction(scene, child, event)
    case 'task':
      return playTask(scene, child, { ...event, demoToday })
    case 'finish_task':
      return playTaskEnd(scene, child, event.index, event.by)
    case 'finish_own_tasks':
      return playOwnTasksEnd(scene, child, event.taskKind, event.by)
  }
}
