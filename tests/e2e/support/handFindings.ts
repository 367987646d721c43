import { addDays } from '../../../shared/days.ts'
import type { HandUseAnswer } from '../../../shared/handUse.ts'
import type {
  MeasureDetails,
  MeasureKind,
  MeasureView,
  Side,
  SidesDetails,
  SkillDetails,
  Tries,
} from '../../../shared/measures.ts'
import type { Informant, QuestionnaireView } from '../../../shared/questionnaires.ts'
import { reachOrder } from '../../../shared/reaching.ts'
import type { Hand } from '../../../shared/roles.ts'
import type { Person } from './browser.ts'
import { callApi, today, type FreshChild } from './newChild.ts'

/** What the page must show of a row: worked out by hand beside the answers below, not by the product. */
export interface ExpectedRow {
  measure: string
  value: string
  side: string
}

const answered = async (
  therapist: Person,
  { childId }: FreshChild,
  given: { formId: string; informant: Informant; daysAgo: number; answers: readonly HandUseAnswer[] },
): Promise<void> => {
  const base = `/children/${childId}/questionnaires`
  const { formId, informant, answers } = given
  const answeredOn = addDays(today(), -given.daysAgo)
  const start = { formId, informant, respondentName: null, answeredOn, replacesId: null }
  const begun = await callApi<QuestionnaireView>(therapist, 'POST', base, { data: start })
  const saved = await callApi<QuestionnaireView>(therapist, 'PUT', `${base}/${begun.id}`, {
    version: begun.version,
    data: {
      informant,
      respondentName: null,
      answeredOn,
      answers: Object.fromEntries(
        begun.form.definition.items.map(({ id }, index) => [id, answers[index % answers.length]]),
      ),
      cutOffSet: begun.cutOffSet,
      comment: null,
    },
  })
  await callApi(therapist, 'POST', `${base}/${begun.id}/lock`, { version: saved.version })
}

const measured = async (
  therapist: Person,
  { childId }: FreshChild,
  kind: MeasureKind,
  daysAgo: number,
  fill: (details: MeasureDetails) => MeasureDetails,
): Promise<void> => {
  const base = `/children/${childId}/measures`
  const measuredOn = addDays(today(), -daysAgo)
  const begun = await callApi<MeasureView>(therapist, 'POST', base, {
    data: { kind, measuredOn, replacesId: null },
  })
  const saved = await callApi<MeasureView>(therapist, 'PUT', `${base}/${begun.id}`, {
    version: begun.version,
    data: { measuredOn, details: fill(begun.details), notDoneReason: null, comment: null },
  })
  await callApi(therapist, 'POST', `${base}/${begun.id}/lock`, { version: saved.version })
}

const reached =
  (handOf: (reach: number) => Hand | null) =>
  (details: MeasureDetails): MeasureDetails => {
    if (details.kind !== 'reaching') throw new Error('Not a measure of reaching')
    const order = reachOrder(details.seed, 3)
    return {
      ...details,
      reaches: order.map((place, index) => ({ place, hand: handOf(index), swapped: false })),
    }
  }

const tried =
  (left: readonly number[], right: readonly number[]) =>
  (details: MeasureDetails): MeasureDetails => {
    const trials = left.flatMap((value, round) => [
      { hand: 'left' as const, value, interrupted: false, confirmed: false },
      { hand: 'right' as const, value: right[round] ?? null, interrupted: false, confirmed: false },
    ])
    return { ...(details as SkillDetails), trials }
  }

const always = (side: Side): Tries => [side, side, side]
const sides = (details: MeasureDetails): MeasureDetails => ({
  ...(details as SidesDetails),
  foot: {
    kick: always('left'),
    hop: always('right'),
    step_up: always('right'),
    pebble: always('right'),
  },
  eye: { far: always('right'), near: ['left', 'left', 'right'] },
  eyeFarMetres: 3,
  ear: { listen: always('left'), phone: always('left') },
})

/**
 * Puts a measure of every kind on the record of a child, who answers left and reaches right, and tells what the rows
 * must show.
 */
export const recordEverything = async (therapist: Person, child: FreshChild): Promise<ExpectedRow[]> => {
  const ten = 'hand-use-10.v1'
  await answered(therapist, child, {
    formId: ten,
    informant: 'guardian',
    daysAgo: 20,
    answers: ['left', 'left', 'left', 'left', 'right'],
  })
  await answered(therapist, child, {
    formId: ten,
    informant: 'child_demonstrated',
    daysAgo: 10,
    answers: ['strong_left', 'strong_left', 'strong_left', 'right', 'right'],
  })
  await measured(
    therapist,
    child,
    'reaching',
    18,
    reached((reach) => (reach < 16 ? 'left' : 'right')),
  )
  await measured(
    therapist,
    child,
    'reaching',
    4,
    reached((reach) => (reach === 20 ? null : reach < 17 ? 'right' : 'left')),
  )
  await measured(therapist, child, 'pegs', 4, tried([12, 12.4, 12.2], [14, 14.4, 14.2]))
  await measured(therapist, child, 'tapping', 4, tried([50, 52, 51], [44, 45, 43]))
  await measured(therapist, child, 'dots', 4, tried([30, 31, 32], [24, 25, 26]))
  await measured(therapist, child, 'sides', 3, sides)
  return [
    // 8 left, 2 right, a mark each: 100 (2 − 8) / 10.
    { measure: 'Hand use in ten everyday activities, Parent or carer', value: '−60.0', side: 'Left' },
    // 6 left with two marks, 4 right with one: 100 (4 − 12) / 16.
    { measure: 'Hand use in ten everyday activities, Child showed it', value: '−50.0', side: 'Left' },
    // Of 20 counted 17 right, 3 left: 100 (17 − 3) / 20; two-sided sign test p .003.
    { measure: 'Reaching across the midline', value: '+70.0', side: 'Right' },
    // Of 21 counted 16 left, 5 right: 100 (5 − 16) / 21; two-sided sign test p .027.
    { measure: 'Reaching across the midline', value: '−52.4', side: 'Left' },
    // Means 12.2 s and 14.2 s, the quicker hand is the better: 100 (12.2 − 14.2) / 26.4.
    { measure: 'Moving pegs', value: '−7.6', side: 'Left hand ahead' },
    // Means 51 and 44 taps: 100 (44 − 51) / 95.
    { measure: 'Tapping', value: '−7.4', side: 'Left hand ahead' },
    // Means 31 and 25 dots: 100 (25 − 31) / 56.
    { measure: 'Dots in circles', value: '−10.7', side: 'Left hand ahead' },
    // One left, three right of four: 100 × 2 / 4.
    { measure: 'Foot', value: '+50.0', side: 'Right' },
    { measure: 'Eye, far', value: '+100.0', side: 'Right' },
    // Tries that do not agree are mixed.
    { measure: 'Eye, near', value: '0.0', side: 'Mixed' },
    { measure: 'Ear', value: '−100.0', side: 'Left' },
  ]
}
