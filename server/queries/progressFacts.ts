import { adviceItemById } from '../../shared/adviceItems.ts'
import { dayOf, formatDay } from '../../shared/days.ts'
import type { GoalDetails } from '../../shared/goals.ts'
import { lettersPerMinute } from '../../shared/handwriting.ts'
import type { GoalFacts, ProgressFacts, SampleFacts } from '../../shared/letterFacts.ts'
import type { SampleDetails } from '../../shared/samples.ts'
import type { AdviceReply } from '../../shared/schoolAdvice.ts'
import type { NoteDraft, SessionType } from '../../shared/sessionNotes.ts'
import type { ClinicSettings } from '../../shared/settings.ts'
import type { ChildAccess } from '../access/childAccess.ts'
import { notFound } from '../errors.ts'
import { within } from './scope.ts'
import { fromJson, selectOne, selectRows } from './sql.ts'

interface NoteRow {
  heldOn: string
  type: SessionType
  content: string
}

/** Notes that were signed by their author, with the text that was signed, newest first. */
const signedNotes = (access: ChildAccess) => {
  const scope = within(access, 'n.childId')
  return selectRows<NoteRow>(
    `SELECT n.heldOn, n.type, r.content FROM session_notes n
       JOIN note_signatures s ON s.noteId = n.id AND s.kind = 'author' JOIN note_revisions r ON r.id = s.revisionId
     WHERE ${scope.sql} ORDER BY n.heldOn DESC, n.startTime DESC LIMIT 60`,
    scope.parameters,
  )
}

const goalFacts = async (access: ChildAccess, notes: NoteDraft[]): Promise<GoalFacts[]> => {
  const scope = within(access, 'g.childId')
  const rows = await selectRows<{
    id: string
    details: string
    setOn: string
    level: number | null
    ratedOn: string | null
  }>(
    `SELECT g.id, g.details, g.setOn, r.level, r.ratedOn FROM goals g
       LEFT JOIN goal_ratings r ON r.id = (SELECT l.id FROM goal_ratings l WHERE l.goalId = g.id
         ORDER BY l.ratedOn DESC, l.createdAt DESC LIMIT 1)
     WHERE (g.outcome IS NULL OR g.outcome = 'finished') AND ${scope.sql} ORDER BY g.setOn, g.createdAt`,
    scope.parameters,
  )
  return rows.map(({ id, details, setOn, level, ratedOn }) => {
    const goal = fromJson<GoalDetails>(details)
    const levelText = (value: number) => goal.levels[value + 2] ?? goal.activity
    return {
      activity: goal.activity,
      childVoice: goal.childVoice,
      setOn,
      baselineText: levelText(goal.baseline),
      latest: level === null || ratedOn === null ? null : { level, text: levelText(level), ratedOn },
      sessions: notes.filter((note) => note.goalIds.includes(id)).length,
    }
  })
}

const sampleFacts = async (access: ChildAccess): Promise<SampleFacts[]> => {
  const scope = within(access, 's.childId')
  const rows = await selectRows<{ details: string }>(
    `SELECT s.details FROM samples s WHERE s.removedAt IS NULL AND ${scope.sql} ORDER BY s.takenOn`,
    scope.parameters,
  )
  return rows.map((row) => {
    const sample = fromJson<SampleDetails>(row.details)
    const { takenOn, task, script, letters, legibleLetters, reversals, smudge } = sample
    return {
      takenOn,
      task,
      script,
      letters,
      legibleLetters,
      reversals,
      smudge,
      lettersPerMinute: lettersPerMinute(sample),
    }
  })
}

const publishedAdvice = async (access: ChildAccess, timeZone: string) => {
  const scope = within(access, 'a.childId')
  const rows = await selectRows<{ itemId: string; publishedAt: Date; reply: AdviceReply | null }>(
    `SELECT a.itemId, a.publishedAt, (SELECT r.reply FROM advice_answers r WHERE r.adviceId = a.id
       ORDER BY r.at DESC LIMIT 1) AS reply
     FROM school_advice a WHERE a.endedAt IS NULL AND ${scope.sql} ORDER BY a.publishedAt, a.itemId`,
    scope.parameters,
  )
  return rows.flatMap((row) => {
    const item = adviceItemById(row.itemId)
    const source = `Advice ${row.itemId} given on ${formatDay(dayOf(row.publishedAt, timeZone))}`
    return item ? [{ item, reply: row.reply, source }] : []
  })
}

/** All that a progress letter to the family may be assembled from. Reads the record; decides nothing. */
export const readProgressFacts = async (
  access: ChildAccess,
  settings: ClinicSettings,
): Promise<ProgressFacts> => {
  const scope = within(access, 'c.id')
  const child = await selectOne<{
    name: string
    strengths: string | null
    nextReviewOn: string | null
    households: string
    carers: string | null
  }>(
    `SELECT COALESCE(c.preferredName, c.givenName) AS name, c.strengths, c.nextReviewOn,
       (SELECT COUNT(DISTINCT g.address) FROM guardians g WHERE g.childId = c.id AND g.endedAt IS NULL) AS households,
       (SELECT GROUP_CONCAT(g.name ORDER BY g.createdAt, g.id SEPARATOR '\\n') FROM guardians g
         WHERE g.childId = c.id AND g.endedAt IS NULL AND g.restricted = 0 AND g.parentalResponsibility = 'yes') AS carers
     FROM children c WHERE ${scope.sql}`,
    scope.parameters,
  )
  if (!child) throw notFound()
  const rows = await signedNotes(access)
  const notes = rows.map((row) => fromJson<NoteDraft>(row.content))
  const [goals, samples, advice] = await Promise.all([
    goalFacts(access, notes),
    sampleFacts(access),
    publishedAdvice(access, settings.timeZone),
  ])
  const [lastRow] = rows
  const [lastNote] = notes
  return {
    childName: child.name,
    // Two households get the same letter each: it must not name the other one's adults.
    addressedTo: Number(child.households) > 1 || child.carers === null ? [] : child.carers.split('\n'),
    author: access.viewer.displayName,
    clinicName: settings.clinicName,
    clinicPhone: settings.clinicPhone,
    sessions: rows.map(({ heldOn, type }) => ({ heldOn, type })),
    strengths: (child.strengths ?? '')
      .split('\n')
      .map((line) => line.trim())
      .filter((line) => line !== '')
      .map((text) => ({ text, source: 'At a glance: what the child enjoys and does well' })),
    childWords: [],
    samples,
    goals,
    home: advice
      .filter(({ item }) => item.audiences.includes('parent'))
      .map(({ item, source }) => ({ text: item.text, source, minutes: null })),
    lastPlan: lastNote && lastRow ? { text: lastNote.plan, heldOn: lastRow.heldOn } : null,
    schoolAdvice: advice.map(({ item, reply, source }) => ({ text: item.text, source, reply })),
    nextVisitOn: child.nextReviewOn,
  }
}
