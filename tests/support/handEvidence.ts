import { formsOfTheStart } from '../../server/migrations/1764580000000-formsOfTheStart.ts'
import type { FormView } from '../../shared/forms.ts'
import { scoreForm } from '../../shared/formScores.ts'
import { cutOffSetById, defaultCutOffSet, type HandUseAnswer } from '../../shared/handUse.ts'
import type { LockedMeasure } from '../../shared/measureRows.ts'
import { scoreMeasure } from '../../shared/measureScores.ts'
import type { MeasureDetails, Tries } from '../../shared/measures.ts'
import type { LockedResponse } from '../../shared/questionnaireRows.ts'

/* Locked answers and measures as the pure rules of the hand profile take them. */

const answerOf: Record<string, HandUseAnswer | null> = {
  LL: 'strong_left',
  L: 'left',
  B: 'either',
  R: 'right',
  RR: 'strong_right',
  N: 'does_not_do',
  '-': null,
}

export const formNamed = (key: string): FormView => {
  const form = formsOfTheStart.find((candidate) => candidate.key === key)
  if (!form) throw new Error(`There is no form ${key}`)
  return { id: `${form.key}.v${form.edition}`, ...form, retiredAt: null }
}

let made = 0

/** Answers in the order of the form, 'LL L B R RR N -'; a single one is given throughout. */
export const answered = (
  text: string,
  given: Partial<Omit<LockedResponse, 'score' | 'answers'>> & { cutOffs?: string } = {},
): LockedResponse => {
  const { cutOffs = 'clinic-40', form = formNamed('hand-use-10'), ...more } = given
  const codes = text.split(' ')
  const answers = Object.fromEntries(
    form.definition.items.map(({ id }, index) => {
      const answer = answerOf[(codes.length === 1 ? codes[0] : codes[index]) ?? '?']
      if (answer === undefined) throw new Error(`No answer to ${id} in ${text}`)
      return [id, answer]
    }),
  )
  const answeredOn = more.answeredOn ?? '2026-03-03'
  made += 1
  return {
    id: `response-${made}`,
    form,
    informant: 'guardian',
    answers,
    score: scoreForm(form, answers, cutOffSetById(cutOffs) ?? defaultCutOffSet),
    lockedAt: `${answeredOn}T12:00:00.000Z`,
    ...more,
    answeredOn,
  }
}

export const measured = (details: MeasureDetails, given: Partial<LockedMeasure> = {}): LockedMeasure => {
  const measuredOn = given.measuredOn ?? '2026-03-03'
  made += 1
  return {
    id: `measure-${made}`,
    details,
    score: scoreMeasure(details),
    lockedAt: `${measuredOn}T12:00:00.000Z`,
    notDoneReason: null,
    ...given,
    measuredOn,
  }
}

export const tries = (side: Tries[number]): Tries => [side, side, side]

/** One side throughout for foot, far eye, near eye and ear; null is not done. */
export const sidesDetails = (
  foot: Tries[number],
  far: Tries[number],
  near: Tries[number] = far,
  ear: Tries[number] = null,
): MeasureDetails => ({
  kind: 'sides',
  foot: { kick: tries(foot), hop: tries(foot), step_up: tries(foot), pebble: tries(foot) },
  eye: { far: tries(far), near: tries(near) },
  eyeFarMetres: 3,
  ear: { listen: tries(ear), phone: tries(ear) },
})
