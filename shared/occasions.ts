import { compareDays, type Day } from './days.ts'
import type { HandUseAnswer } from './handUse.ts'
import { answerSide } from './informants.ts'
import type { MeasureKind } from './measures.ts'
import type { LockedResponse } from './questionnaireRows.ts'
import { informantLabels, informants, type Informant } from './questionnaires.ts'
import type { ReliableChangeNote } from './reliableChange.ts'
import type { MeasureTrend } from './trends.ts'

/**
 * What became of an activity between two occasions. `firmer` keeps the side and changes always/mostly; `newly` was not
 * answered with a side before, `no_longer` was. "Does not do this yet" is an answer without a hand: the labels must hold
 * for it as for a blank.
 */
export const itemChanges = ['same', 'firmer', 'changed', 'newly', 'no_longer', 'neither'] as const
export type ItemChange = (typeof itemChanges)[number]
export const itemChangeLabels: Record<ItemChange, string> = {
  same: 'Same',
  firmer: 'Same side, more or less often',
  changed: 'Another answer',
  newly: 'With a hand only now',
  no_longer: 'With a hand only before',
  neither: 'With no hand on either day',
}

export interface FormComparison {
  formKey: string
  title: string
  informant: Informant
  informantLabel: string
  before: { responseId: string; on: Day; value: number | null }
  after: { responseId: string; on: Day; value: number | null }
  items: {
    id: string
    label: string
    before: HandUseAnswer | null
    after: HandUseAnswer | null
    change: ItemChange
  }[]
  counts: Record<ItemChange, number>
  reliable: ReliableChangeNote
  /** Says so when the editions differ; null otherwise. */
  caution: string | null
}

export interface MeasureComparison {
  kind: MeasureKind
  title: string
  before: { measureId: string; on: Day }
  after: { measureId: string; on: Day }
  lines: { label: string; before: string; after: string }[]
  /** Says so when the two occasions were taken in different ways; null otherwise. */
  caution: string | null
  reliable: ReliableChangeNote | null
  /** Means of each hand for `reliableChange`, where somebody has a published SD and coefficient at hand. Else empty. */
  means: { label: string; before: number | null; after: number | null }[]
  /** Of each hand over three different days or more; empty otherwise. */
  trends: MeasureTrend[]
}

/** How one answer became another. */
export function itemChange(before: HandUseAnswer | null, after: HandUseAnswer | null): ItemChange {
  const [from, to] = [answerSide(before), answerSide(after)]
  if (from === null && to === null) return before === after && before !== null ? 'same' : 'neither'
  if (from === null) return 'newly'
  if (to === null) return 'no_longer'
  if (from !== to) return 'changed'
  return before === after ? 'same' : 'firmer'
}

const quotientNotUsed: ReliableChangeNote = {
  used: false,
  why:
    'Reliable change is not worked out for the quotient: it is bounded and most people stand near its ends, so a standard ' +
    'deviation describes it poorly, and no retest coefficient for children was found. Read it activity by activity.',
  cautions: [],
}

const newestFirst = (a: { on: Day; lockedAt: string }, b: { on: Day; lockedAt: string }) =>
  compareDays(b.on, a.on) || (a.lockedAt < b.lockedAt ? 1 : -1)

const countsOf = (changes: readonly ItemChange[]): Record<ItemChange, number> => {
  const of = (wanted: ItemChange) => changes.filter((change) => change === wanted).length
  return {
    same: of('same'),
    firmer: of('firmer'),
    changed: of('changed'),
    newly: of('newly'),
    no_longer: of('no_longer'),
    neither: of('neither'),
  }
}

function compareForms(before: LockedResponse, after: LockedResponse): FormComparison {
  const items = after.form.definition.items.map(({ id, label }) => {
    const [was, is] = [before.answers[id] ?? null, after.answers[id] ?? null]
    return { id, label, before: was, after: is, change: itemChange(was, is) }
  })
  const side = ({ id, answeredOn, score }: LockedResponse) => ({
    responseId: id,
    on: answeredOn,
    value: score.quotient,
  })
  return {
    formKey: after.form.key,
    title: after.form.definition.title,
    informant: after.informant,
    informantLabel: informantLabels[after.informant],
    before: side(before),
    after: side(after),
    items,
    counts: countsOf(items.map(({ change }) => change)),
    reliable: quotientNotUsed,
    caution:
      before.form.edition === after.form.edition
        ? null
        : 'Two editions of the form: the wording of an activity may differ.',
  }
}

/** The two newest occasions of each form by the same kind of informant, activity by activity. */
export function compareFormOccasions(responses: readonly LockedResponse[]): FormComparison[] {
  const keys = [...new Set(responses.map(({ form }) => form.key))]
  return keys.flatMap((key) =>
    informants.flatMap((informant) => {
      const [after, before] = responses
        .filter((response) => response.form.key === key && response.informant === informant)
        .map((response) => ({ ...response, on: response.answeredOn }))
        .toSorted(newestFirst)
      return after && before ? [compareForms(before, after)] : []
    }),
  )
}
