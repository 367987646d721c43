import type {
  CareDetails,
  ChildHeader,
  ChildIdentityView,
  FoundChild,
  RegisterRow,
} from '../../../shared/children.ts'
import { correctedAgeText } from '../../../shared/correctedAge.ts'
import { formatAge, type Day } from '../../../shared/days.ts'
import type { ClinicSettings } from '../../../shared/settings.ts'
import type { ChildAccess } from '../../access/childAccess.ts'
import { canChangeIdentity, sectionsFor, seesClinicalFields } from '../../policies/children.ts'
import { canStartLetter } from '../../policies/letters.ts'
import { canCreateNote } from '../../policies/sessionNotes.ts'
import type { CareRow } from '../../queries/children/care.ts'
import type { AlertRow, ChildFactsRow } from '../../queries/children/header.ts'
import type { IdentityRow } from '../../queries/children/identity.ts'
import type { FoundChildRow, RegisterListRow } from '../../queries/children/lists.ts'
import type { EpisodeRow } from '../../queries/episodes.ts'

interface Named {
  givenName: string
  familyName: string
}

export const fullName = ({ givenName, familyName }: Named) => `${givenName} ${familyName}`

export const presentChildHeader = (
  child: ChildFactsRow,
  alerts: readonly AlertRow[],
  access: ChildAccess,
  settings: ClinicSettings,
  today: Day,
): ChildHeader => {
  const clinical = seesClinicalFields(access)
  return {
    id: child.id,
    recordNumber: child.recordNumber,
    name: fullName(child),
    preferredName: child.preferredName,
    birthDate: child.birthDate,
    age: formatAge(child.birthDate, today),
    relation: access.relation,
    school: child.schoolName,
    className: child.className,
    interpreterLanguage: child.interpreterLanguage,
    lookedAfter: child.lookedAfter,
    courtOrder: child.courtOrder,
    consentsForSelf: child.consentsForSelf,
    state: clinical ? child.state : null,
    therapist: child.therapist,
    alerts: clinical
      ? alerts.map(({ id, text, level, urgency, advice, raisedAt }) => ({
          id,
          text,
          level,
          urgency,
          advice,
          raisedAt: raisedAt.toISOString(),
        }))
      : [],
    emergencyText:
      clinical && alerts.some(({ urgency }) => urgency === 'same_day') ? settings.emergencyText : null,
    correctedAge: clinical
      ? correctedAgeText({
          birth: child.birthDate,
          on: today,
          gestationWeeks: child.gestationWeeks,
          limitMonths: settings.correctedUntilMonths,
        })
      : null,
    sections: sectionsFor(access.relation),
    namesake: child.namesake,
    can: { writeNote: canCreateNote(access), startLetter: canStartLetter(access) },
  }
}

export const presentIdentity = (row: IdentityRow, access: ChildAccess): ChildIdentityView => ({
  id: row.id,
  recordNumber: row.recordNumber,
  givenName: row.givenName,
  familyName: row.familyName,
  preferredName: row.preferredName,
  birthDate: row.birthDate,
  homeLanguages: row.homeLanguages,
  interpreterLanguage: row.interpreterLanguage,
  scriptDirection: row.scriptDirection,
  classId: row.classId,
  lookedAfter: row.lookedAfter,
  consentsForSelf: row.consentsForSelf,
  version: row.version,
  can: { change: canChangeIdentity(access) },
})

/** What a stale save of the care details is answered with. */
export const presentCare = (row: CareRow): CareDetails & { version: number } => ({
  writingHand: row.writingHand,
  nextReviewOn: row.nextReviewOn,
  strengths: row.strengths,
  version: row.version,
})

/** What a stale change of state is answered with. */
export const presentEpisodeState = ({ state, version }: EpisodeRow) => ({ state, episodeVersion: version })

export const presentFoundChild = (row: FoundChildRow): FoundChild => ({
  id: row.id,
  recordNumber: row.recordNumber,
  name: fullName(row),
  birthDate: row.birthDate,
  school: row.schoolName,
})

export const presentRegisterRow = (row: RegisterListRow): RegisterRow => ({
  ...presentFoundChild(row),
  className: row.className,
  therapist: row.therapist,
  carers: row.carers,
})
