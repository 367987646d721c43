import type { MigrationInterface, QueryRunner } from 'typeorm'

/** Rows of these tables are written once: nobody changes or removes them, whatever the application asks. */
const writtenOnce = [
  'audit_entries',
  'consents',
  'episode_changes',
  'note_revisions',
  'note_signatures',
  'note_addenda',
  'goal_ratings',
  'writing_observations',
  'letter_versions',
  'advice_answers',
]

const refuse = (why: string) => `SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = '${why}'`

const changed = (...columns: string[]) =>
  columns.map((column) => `NOT (NEW.${column} <=> OLD.${column})`).join(' OR ')

/** Trigger name, moment and table, and when it refuses (null: always). */
const guards: [name: string, moment: string, condition: string | null, why: string][] = [
  ...writtenOnce.flatMap((table): [string, string, null, string][] => [
    [`${table}_keep`, `BEFORE UPDATE ON ${table}`, null, `${table} is written once`],
    [`${table}_stay`, `BEFORE DELETE ON ${table}`, null, `${table} is never removed`],
  ]),
  ['session_notes_keep', 'BEFORE UPDATE ON session_notes', "OLD.state = 'signed'", 'a signed note is closed'],
  [
    'session_notes_hold',
    'BEFORE UPDATE ON session_notes',
    `OLD.state = 'awaiting_countersignature' AND (NEW.state <> 'signed' OR ${changed('childId', 'authorId', 'heldOn', 'startTime', 'minutes', 'type', 'summary', 'discardedAt')})`,
    'a note waiting for its countersignature is closed',
  ],
  ['session_notes_stay', 'BEFORE DELETE ON session_notes', null, 'notes are never removed'],
  [
    'questionnaire_responses_keep',
    'BEFORE UPDATE ON questionnaire_responses',
    'OLD.lockedAt IS NOT NULL',
    'a locked response is closed',
  ],
  [
    'questionnaire_responses_stay',
    'BEFORE DELETE ON questionnaire_responses',
    'OLD.lockedAt IS NOT NULL',
    'a locked response is closed',
  ],
  [
    'letters_keep',
    'BEFORE UPDATE ON letters',
    `OLD.state <> 'draft' AND (${changed('content', 'facts', 'childId', 'authorId')})`,
    'only a draft letter can be changed',
  ],
  [
    'letters_sent',
    'BEFORE UPDATE ON letters',
    "OLD.state = 'sent' AND NEW.state <> 'sent'",
    'a sent letter stays sent',
  ],
  ['letters_stay', 'BEFORE DELETE ON letters', null, 'letters are never removed'],
  [
    'samples_keep',
    'BEFORE UPDATE ON samples',
    changed('content', 'thumbnail', 'sha256', 'originalSha256', 'contentType'),
    'a stored sample is never changed',
  ],
  ['samples_stay', 'BEFORE DELETE ON samples', null, 'samples are never removed'],
  [
    'outbox_messages_keep',
    'BEFORE UPDATE ON outbox_messages',
    changed('mime', 'mimeSha256', 'messageId', 'recipient'),
    'a queued e-mail is never changed',
  ],
]

/** Names of the triggers; the boot checks that each is there. */
export const guardNames = guards.map(([name]) => name)

export class CloseWhatIsClosed1764547300000 implements MigrationInterface {
  name = 'CloseWhatIsClosed1764547300000'

  async up(runner: QueryRunner): Promise<void> {
    for (const [name, moment, condition, why] of guards) {
      const body = condition === null ? refuse(why) : `IF ${condition} THEN ${refuse(why)}; END IF`
      await runner.query(`CREATE TRIGGER ${name} ${moment} FOR EACH ROW ${body}`)
    }
    // The app account sees neither triggers nor keys in the information schema; these views look with the owner's eyes.
    await runner.query(
      `CREATE SQL SECURITY DEFINER VIEW guard_names AS
        SELECT TRIGGER_NAME AS name FROM information_schema.TRIGGERS WHERE TRIGGER_SCHEMA = DATABASE()`,
    )
    await runner.query(
      `CREATE SQL SECURITY DEFINER VIEW passing_keys AS
        SELECT CONSTRAINT_NAME AS name FROM information_schema.REFERENTIAL_CONSTRAINTS
        WHERE CONSTRAINT_SCHEMA = DATABASE()
          AND (DELETE_RULE NOT IN ('RESTRICT', 'NO ACTION') OR UPDATE_RULE NOT IN ('RESTRICT', 'NO ACTION'))`,
    )
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP VIEW guard_names, passing_keys')
    for (const name of guardNames) await runner.query(`DROP TRIGGER ${name}`)
  }
}
