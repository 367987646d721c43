import type { Attention } from '../../../shared/attention.ts'
import type { WritingHand } from '../../../shared/children.ts'
import type { ConsentPurpose } from '../../../shared/consents.ts'
import type { Day } from '../../../shared/days.ts'
import type { EpisodeState } from '../../../shared/episodes.ts'
import type { RedFlagUrgency } from '../../../shared/redFlagRows.ts'
import type { ReferralConcern, ScriptDirection } from '../../../shared/referrals.ts'
import type { ChildAccess } from '../../access/childAccess.ts'
import { now } from '../../clock.ts'
import { notFound } from '../../errors.ts'
import { therapistName } from '../currentTherapist.ts'
import { latestEpisode } from '../episodes.ts'
import { consentHolds } from '../inForce.ts'
import { within } from '../scope.ts'
import { flag, fromJson, selectOne, selectRows } from '../sql.ts'

export interface ChildFactsRow {
  id: string
  recordNumber: string
  givenName: string
  familyName: string
  preferredName: string | null
  birthDate: Day
  homeLanguages: string | null
  interpreterLanguage: string | null
  scriptDirection: ScriptDirection
  lookedAfter: boolean
  consentsForSelf: boolean
  writingHand: WritingHand | null
  strengths: string | null
  nextReviewOn: Day | null
  version: number
  className: string | null
  schoolName: string | null
  therapist: string | null
  courtOrder: boolean
  namesake: boolean
  episodeId: string | null
  episodeVersion: number | null
  state: EpisodeState | null
  receivedOn: Day | null
  reason: string | null
  concerns: ReferralConcern[]
  /** Of the newest history that says it; completed weeks. */
  gestationWeeks: number | null
  consentsInForce: ConsentPurpose[]
}

type Flags = 'lookedAfter' | 'consentsForSelf' | 'courtOrder' | 'namesake'
type StoredFacts = Omit<ChildFactsRow, Flags | 'concerns' | 'gestationWeeks' | 'consentsInForce'> &
  Record<Flags, number> & {
    concerns: string | null
    gestationWeeks: string | null
    consentsInForce: string | null
  }

/** Identity, school, latest episode with its referral, and what marks the head of a record; one query. */
export const findChildHead = async (access: ChildAccess): Promise<ChildFactsRow> => {
  const scope = within(access, 'c.id')
  const therapist = therapistName('c.id')
  const row = await selectOne<StoredFacts>(
    `SELECT c.id, c.recordNumber, c.givenName, c.familyName, c.preferredName, c.birthDate, c.homeLanguages,
       c.interpreterLanguage, c.scriptDirection, c.lookedAfter, c.consentsForSelf, c.writingHand, c.strengths,
       c.nextReviewOn, c.version, k.name AS className, s.name AS schoolName, ${therapist.sql} AS therapist,
       EXISTS (SELECT 1 FROM guardians g WHERE g.childId = c.id AND g.courtOrder = 1 AND g.endedAt IS NULL) AS courtOrder,
       EXISTS (SELECT 1 FROM children o WHERE o.id <> c.id AND o.familyName = c.familyName
         AND o.givenName = c.givenName) AS namesake,
       e.id AS episodeId, e.version AS episodeVersion, e.state, e.receivedOn,
       JSON_VALUE(r.details, '$.reason') AS reason, JSON_QUERY(r.details, '$.concerns') AS concerns,
       (SELECT JSON_VALUE(h.details, '$.gestationWeeks') FROM histories h WHERE h.childId = c.id
         AND JSON_VALUE(h.details, '$.gestationWeeks') IS NOT NULL
         ORDER BY h.answeredOn DESC, h.createdAt DESC, h.id LIMIT 1) AS gestationWeeks,
       (SELECT GROUP_CONCAT(DISTINCT f.purpose) FROM consents f WHERE f.childId = c.id
         AND ${consentHolds('f')}) AS consentsInForce
     FROM children c LEFT JOIN school_classes k ON k.id = c.schoolClassId LEFT JOIN schools s ON s.id = k.schoolId
       LEFT JOIN episodes e ON e.id = ${latestEpisode('c.id')} LEFT JOIN referrals r ON r.id = e.referralId
     WHERE ${scope.sql}`,
    { ...scope.parameters, ...therapist.parameters, now: now() },
  )
  if (!row) throw notFound()
  return {
    ...row,
    lookedAfter: flag(row.lookedAfter),
    consentsForSelf: flag(row.consentsForSelf),
    courtOrder: flag(row.courtOrder),
    namesake: flag(row.namesake),
    gestationWeeks: row.gestationWeeks === null ? null : Number(row.gestationWeeks),
    concerns: row.concerns === null ? [] : fromJson<ReferralConcern[]>(row.concerns),
    consentsInForce: row.consentsInForce === null ? [] : (row.consentsInForce.split(',') as ConsentPurpose[]),
  }
}

export interface AlertRow {
  id: string
  text: string
  level: Attention
  urgency: RedFlagUrgency
  advice: string | null
  raisedAt: Date
}

/** Warning signs nobody has acted on yet, the most pressing first. */
export const listOpenAlerts = (access: ChildAccess): Promise<AlertRow[]> => {
  const scope = within(access, 'a.childId')
  return selectRows<AlertRow>(
    `SELECT a.id, a.text, a.level, a.urgency, a.advice, a.raisedAt FROM alerts a
     WHERE a.actedAt IS NULL AND ${scope.sql}
     ORDER BY a.urgency = 'same_day' DESC, FIELD(a.level, 'overdue', 'due', 'soon'), a.raisedAt, a.id`,
    scope.parameters,
  )
}
