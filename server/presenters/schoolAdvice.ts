import { cautionFor, offeredAdvice, type AdviceOffer } from '../../shared/advice.ts'
import type { AdviceFacts } from '../../shared/adviceFacts.ts'
import { adviceGradeLabels } from '../../shared/adviceItem.ts'
import { adviceItemById } from '../../shared/adviceItems.ts'
import { dayOf } from '../../shared/days.ts'
import type { ScriptDirection } from '../../shared/referrals.ts'
import type { ChildSchoolView, OfferedAdvice, PublishedAdvice } from '../../shared/schoolAdvice.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { canEndAdvice, canPublishAdvice, canReplyToAdvice } from '../policies/schoolAdvice.ts'
import type { AdviceRow, ChildSchoolRow } from '../queries/schoolAdvice.ts'

/** An item as given to the school; text and caution stand in the library, the reason is the therapist's. */
export const presentAdvice = (
  rows: readonly AdviceRow[],
  access: ChildAccess,
  scriptDirection: ScriptDirection | null,
  timeZone: string,
): PublishedAdvice[] =>
  rows.flatMap((row) => {
    const item = adviceItemById(row.itemId)
    if (!item) return []
    const { reply, replyReason, repliedBy, repliedAt } = row
    return {
      id: row.id,
      itemId: row.itemId,
      text: item.text,
      because: row.because,
      caution: cautionFor(item, scriptDirection),
      checkBy: row.checkBy,
      publishedOn: dayOf(row.publishedAt, timeZone),
      endedOn: row.endedAt && dayOf(row.endedAt, timeZone),
      reply:
        reply === null || repliedBy === null || repliedAt === null
          ? null
          : { answer: reply, reason: replyReason, by: repliedBy, at: repliedAt.toISOString() },
      can: { reply: canReplyToAdvice(access, row), end: canEndAdvice(access, row) },
    }
  })

const presentOffer = (
  { item, triggeredBy, caution }: AdviceOffer,
  live: ReadonlySet<string>,
): OfferedAdvice => ({
  itemId: item.id,
  text: item.text,
  because: item.because,
  triggeredBy,
  caution,
  grade: adviceGradeLabels[item.grade],
  source: item.source,
  published: live.has(item.id),
})

export const presentChildSchool = (
  school: ChildSchoolRow,
  related: { facts: AdviceFacts; shared: boolean; advice: AdviceRow[] },
  access: ChildAccess,
  timeZone: string,
): ChildSchoolView => {
  const live = new Set(related.advice.filter((row) => row.endedAt === null).map((row) => row.itemId))
  return {
    school: school.school,
    className: school.className,
    teacher: school.teacher,
    shared: related.shared,
    offered: offeredAdvice(related.facts, 'teacher').map((offer) => presentOffer(offer, live)),
    published: presentAdvice(related.advice, access, related.facts.scriptDirection, timeZone),
    can: { publish: canPublishAdvice(access, related.shared) },
  }
}
