import type { Attention } from '../../../shared/attention.ts'
import type { Day } from '../../../shared/days.ts'
import type { EpisodeState } from '../../../shared/episodes.ts'
import type { LetterState } from '../../../shared/letters.ts'
import type { RedFlagUrgency } from '../../../shared/redFlagRows.ts'
import type { Role } from '../../../shared/roles.ts'
import type { NoteState } from '../../../shared/sessionNotes.ts'
import type { ChildAccess } from '../../access/childAccess.ts'
import { within } from '../scope.ts'
import { fromJson, selectOne, selectRows } from '../sql.ts'
import type { AlertRow } from './header.ts'

export interface LastOnRecord {
  note: { id: string; heldOn: Day; state: NoteState; plan: string } | null
  sample: {
    id: string
    takenOn: Day
    letters: number | null
    legibleLetters: number | null
    seconds: number | null
  } | null
  letter: { id: string; state: LetterState; changedAt: string } | null
}

/** The newest note, sample and letter; one query. */
export const findLastOnRecord = async (access: ChildAccess): Promise<LastOnRecord> => {
  const noteScope = within(access, 'n.childId')
  const sampleScope = within(access, 's.childId')
  const letterScope = within(access, 'l.childId')
  const row = await selectOne<Record<keyof LastOnRecord, string | null>>(
    `SELECT
       (SELECT JSON_OBJECT('id', n.id, 'heldOn', n.heldOn, 'state', n.state, 'plan', JSON_VALUE(v.content, '$.plan'))
         FROM session_notes n JOIN note_revisions v ON v.noteId = n.id AND v.revision =
           (SELECT MAX(m.revision) FROM note_revisions m WHERE m.noteId = n.id)
         WHERE n.discardedAt IS NULL AND ${noteScope.sql}
         ORDER BY n.heldOn DESC, n.startTime DESC, n.id LIMIT 1) AS note,
       (SELECT JSON_OBJECT('id', s.id, 'takenOn', s.takenOn, 'letters', JSON_EXTRACT(s.details, '$.letters'),
           'legibleLetters', JSON_EXTRACT(s.details, '$.legibleLetters'), 'seconds', JSON_EXTRACT(s.details, '$.seconds'))
         FROM samples s WHERE s.removedAt IS NULL AND ${sampleScope.sql}
         ORDER BY s.takenOn DESC, s.uploadedAt DESC, s.id LIMIT 1) AS sample,
       (SELECT JSON_OBJECT('id', l.id, 'state', l.state, 'changedAt', DATE_FORMAT(l.changedAt, '%Y-%m-%dT%T.%fZ'))
         FROM letters l WHERE l.discardedAt IS NULL AND ${letterScope.sql}
         ORDER BY l.changedAt DESC, l.id LIMIT 1) AS letter`,
    noteScope.parameters,
  )
  const parsed = <K extends keyof LastOnRecord>(key: K): LastOnRecord[K] | null =>
    row?.[key] ? fromJson<LastOnRecord[K]>(row[key]) : null
  return { note: parsed('note'), sample: parsed('sample'), letter: parsed('letter') }
}

export interface TaskRow {
  id: string
  kind: string
  text: string
  dueOn: Day | null
  assigneeId: string | null
  forRole: Role | null
}

export interface ChangeRow {
  from: EpisodeState | null
  to: EpisodeState
  reason: string
  by: string
  at: Date
}

export interface RatedGoalRow {
  id: string
  activity: string
  level: number | null
}

export interface GlanceLists {
  alerts: AlertRow[]
  tasks: TaskRow[]
  changes: ChangeRow[]
  goals: RatedGoalRow[]
}

interface GlanceLine {
  kind: keyof GlanceLists
  id: string
  text: string
  one: string | null
  two: string | null
  three: string | null
  day: Day | null
  at: Date | null
}

/** Open warning signs, open tasks, goals under way and every change of state, newest last; one query. */
export const listForGlance = async (access: ChildAccess): Promise<GlanceLists> => {
  const scope = (column: string) => within(access, column).sql
  const lines = await selectRows<GlanceLine>(
    `SELECT 'alerts' AS kind, CAST(a.id AS CHAR) AS id, a.text, a.level AS one, a.urgency AS two, a.advice AS three, CAST(NULL AS DATE) AS day, a.raisedAt AS at
       FROM alerts a WHERE a.actedAt IS NULL AND ${scope('a.childId')}
     UNION ALL SELECT 'tasks', CAST(t.id AS CHAR), t.text, CAST(t.assigneeId AS CHAR), t.forRole, t.kind, t.dueOn, t.createdAt
       FROM tasks t WHERE t.doneAt IS NULL AND ${scope('t.childId')}
     UNION ALL SELECT 'goals', CAST(g.id AS CHAR), JSON_VALUE(g.details, '$.activity'), (SELECT CAST(q.level AS CHAR) FROM goal_ratings q
         WHERE q.goalId = g.id ORDER BY q.ratedOn DESC, q.createdAt DESC, q.id LIMIT 1), NULL, NULL, g.setOn, g.createdAt
       FROM goals g WHERE g.endedOn IS NULL AND ${scope('g.childId')}
     UNION ALL SELECT 'changes', u.displayName, x.reason, x.fromState, x.toState, NULL, NULL, x.at
       FROM episode_changes x JOIN episodes e ON e.id = x.episodeId JOIN users u ON u.id = x.byId
       WHERE ${scope('e.childId')}
     ORDER BY at, day, id`,
    within(access, 'a.childId').parameters,
  )
  const of = (kind: keyof GlanceLists) => lines.filter((line) => line.kind === kind)
  return {
    alerts: of('alerts').flatMap(({ id, text, one, two, three, at }) =>
      at === null
        ? []
        : [
            {
              id,
              text,
              level: one as Attention,
              urgency: two as RedFlagUrgency,
              advice: three,
              raisedAt: at,
            },
          ],
    ),
    tasks: of('tasks').flatMap(({ id, text, one, two, three, day }) =>
      three === null
        ? []
        : [{ id, kind: three, text, dueOn: day, assigneeId: one, forRole: two as Role | null }],
    ),
    goals: of('goals').map(({ id, text, one }) => ({
      id,
      activity: text,
      level: one === null ? null : Number(one),
    })),
    changes: of('changes').flatMap(({ id, text, one, two, at }) =>
      at === null
        ? []
        : [{ by: id, reason: text, from: one as EpisodeState | null, to: two as EpisodeState, at }],
    ),
  }
}
