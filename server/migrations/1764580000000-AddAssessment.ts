import type { MigrationInterface, QueryRunner } from 'typeorm'
import { formsOfTheStart } from './1764580000000-formsOfTheStart.ts'

const tables = [
  `CREATE TABLE \`questionnaire_forms\` (\`id\` varchar(40) NOT NULL, \`formKey\` varchar(32) NOT NULL, \`edition\` int NOT NULL, \`definition\` json NOT NULL, \`createdAt\` datetime(6) NOT NULL, \`createdById\` uuid NULL, \`retiredAt\` datetime(6) NULL, \`retiredById\` uuid NULL, UNIQUE INDEX \`IDX_12f058591305cba2e0a65ab965\` (\`formKey\`, \`edition\`), PRIMARY KEY (\`id\`)) ENGINE=InnoDB`,
  `CREATE TABLE \`answer_requests\` (\`id\` uuid NOT NULL, \`childId\` uuid NOT NULL, \`asks\` varchar(16) NOT NULL, \`formId\` varchar(40) NULL, \`answerer\` varchar(10) NOT NULL, \`guardianId\` uuid NULL, \`teacherId\` uuid NULL, \`tokenHash\` binary(32) NULL, \`askedAt\` datetime(6) NOT NULL, \`askedById\` uuid NOT NULL, \`expiresAt\` datetime(6) NOT NULL, \`reminders\` int NOT NULL DEFAULT '0', \`remindedAt\` datetime(6) NULL, \`savedAt\` datetime(6) NULL, \`mailId\` uuid NULL, \`answeredAt\` datetime(6) NULL, \`cancelledAt\` datetime(6) NULL, \`cancelledWhy\` varchar(10) NULL, \`wrongDates\` int NOT NULL DEFAULT '0', \`version\` int NOT NULL, INDEX \`IDX_872db0726f1b36f741304e83fd\` (\`answeredAt\`, \`expiresAt\`), UNIQUE INDEX \`IDX_c9beb963ccfbb2874edb717ae4\` (\`tokenHash\`), PRIMARY KEY (\`id\`)) ENGINE=InnoDB`,
  `CREATE TABLE \`conclusions\` (\`id\` uuid NOT NULL, \`childId\` uuid NOT NULL, \`authorId\` uuid NOT NULL, \`state\` varchar(26) NOT NULL, \`content\` json NOT NULL, \`evidence\` json NULL, \`signedAt\` datetime(6) NULL, \`countersignedAt\` datetime(6) NULL, \`countersignedById\` uuid NULL, \`replacesId\` uuid NULL, \`createdAt\` datetime(6) NOT NULL, \`version\` int NOT NULL, UNIQUE INDEX \`IDX_de40030b51eedeb2cc56327ec2\` (\`replacesId\`), PRIMARY KEY (\`id\`)) ENGINE=InnoDB`,
  `CREATE TABLE \`histories\` (\`id\` uuid NOT NULL, \`childId\` uuid NOT NULL, \`informant\` varchar(12) NOT NULL, \`respondentName\` varchar(120) NULL, \`answeredOn\` date NOT NULL, \`details\` json NOT NULL, \`requestId\` uuid NULL, \`guardianId\` uuid NULL, \`startedById\` uuid NULL, \`lockedAt\` datetime(6) NULL, \`lockedById\` uuid NULL, \`replacesId\` uuid NULL, \`createdAt\` datetime(6) NOT NULL, \`version\` int NOT NULL, UNIQUE INDEX \`IDX_accaec34a33138051cfd3f00ee\` (\`requestId\`), UNIQUE INDEX \`IDX_4a6b8f079a614b50c4cc664cdc\` (\`replacesId\`), PRIMARY KEY (\`id\`)) ENGINE=InnoDB`,
  `CREATE TABLE \`measures\` (\`id\` uuid NOT NULL, \`childId\` uuid NOT NULL, \`kind\` varchar(20) NOT NULL, \`methodVersion\` varchar(40) NOT NULL, \`measuredOn\` date NOT NULL, \`details\` json NOT NULL, \`score\` json NULL, \`notDoneReason\` varchar(300) NULL, \`comment\` varchar(1000) NULL, \`startedById\` uuid NOT NULL, \`lockedAt\` datetime(6) NULL, \`lockedById\` uuid NULL, \`replacesId\` uuid NULL, \`createdAt\` datetime(6) NOT NULL, \`version\` int NOT NULL, UNIQUE INDEX \`IDX_736212e41e6f759002829cec52\` (\`replacesId\`), PRIMARY KEY (\`id\`)) ENGINE=InnoDB`,
]

const columns = [
  `ALTER TABLE \`alerts\` ADD \`urgency\` varchar(16) NOT NULL`,
  `ALTER TABLE \`alerts\` ADD \`advice\` varchar(500) NULL`,
  `ALTER TABLE \`alerts\` ADD \`origin\` varchar(16) NOT NULL`,
  `ALTER TABLE \`alerts\` ADD \`originId\` uuid NULL`,
  `ALTER TABLE \`alerts\` ADD \`holdsBooking\` tinyint NOT NULL DEFAULT 0`,
  `ALTER TABLE \`alerts\` ADD \`raisedById\` uuid NULL`,
  `ALTER TABLE \`questionnaire_responses\` ADD \`requestId\` uuid NULL`,
  `ALTER TABLE \`questionnaire_responses\` ADD UNIQUE INDEX \`IDX_52e306d2704626c7e25e0c6d28\` (\`requestId\`)`,
  `ALTER TABLE \`questionnaire_responses\` ADD \`guardianId\` uuid NULL`,
  `ALTER TABLE \`questionnaire_responses\` DROP FOREIGN KEY \`FK_574fb9f7fc2238ca9fdabd9fcaf\``,
  `ALTER TABLE \`questionnaire_responses\` CHANGE \`startedById\` \`startedById\` uuid NULL`,
]

const keys = [
  `ALTER TABLE \`alerts\` ADD CONSTRAINT \`FK_f4418aa4e56050aa8f5296e68a8\` FOREIGN KEY (\`raisedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`questionnaire_forms\` ADD CONSTRAINT \`FK_1ac5739ab9b7bb514df363684e4\` FOREIGN KEY (\`createdById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`questionnaire_forms\` ADD CONSTRAINT \`FK_e916cb708809fb64716e3a9a31d\` FOREIGN KEY (\`retiredById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`answer_requests\` ADD CONSTRAINT \`FK_aacd3aa08016cab47620e8c3f6a\` FOREIGN KEY (\`childId\`) REFERENCES \`children\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`answer_requests\` ADD CONSTRAINT \`FK_d68a35fe734e0d9c12650e8a4c6\` FOREIGN KEY (\`formId\`) REFERENCES \`questionnaire_forms\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`answer_requests\` ADD CONSTRAINT \`FK_49549e6deca65150ac57e4da6b4\` FOREIGN KEY (\`guardianId\`) REFERENCES \`guardians\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`answer_requests\` ADD CONSTRAINT \`FK_71cefe173a6f9feb3b5651af3f7\` FOREIGN KEY (\`teacherId\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`answer_requests\` ADD CONSTRAINT \`FK_50159554081360149ff430294a9\` FOREIGN KEY (\`askedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`answer_requests\` ADD CONSTRAINT \`FK_90e8b61c6e16ca680146d67f302\` FOREIGN KEY (\`mailId\`) REFERENCES \`outbox_messages\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`conclusions\` ADD CONSTRAINT \`FK_7420fd0c0374ed033a6510fb53f\` FOREIGN KEY (\`childId\`) REFERENCES \`children\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`conclusions\` ADD CONSTRAINT \`FK_96e441ea586977ae92465bf2757\` FOREIGN KEY (\`authorId\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`conclusions\` ADD CONSTRAINT \`FK_d6ed38eab0c13bc9b5df9fe5006\` FOREIGN KEY (\`countersignedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`conclusions\` ADD CONSTRAINT \`FK_de40030b51eedeb2cc56327ec2c\` FOREIGN KEY (\`replacesId\`) REFERENCES \`conclusions\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`histories\` ADD CONSTRAINT \`FK_7fde38ad1d30217eada93c45f9d\` FOREIGN KEY (\`childId\`) REFERENCES \`children\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`histories\` ADD CONSTRAINT \`FK_accaec34a33138051cfd3f00ee3\` FOREIGN KEY (\`requestId\`) REFERENCES \`answer_requests\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`histories\` ADD CONSTRAINT \`FK_4384464a6c142845b2ef535f774\` FOREIGN KEY (\`guardianId\`) REFERENCES \`guardians\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`histories\` ADD CONSTRAINT \`FK_cc7e92ef9e2e6e82583cbb3a8d2\` FOREIGN KEY (\`startedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`histories\` ADD CONSTRAINT \`FK_0916c86c67e7c85834347708855\` FOREIGN KEY (\`lockedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`histories\` ADD CONSTRAINT \`FK_4a6b8f079a614b50c4cc664cdcc\` FOREIGN KEY (\`replacesId\`) REFERENCES \`histories\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`measures\` ADD CONSTRAINT \`FK_3e04405a985f40bfe4527d54d1f\` FOREIGN KEY (\`childId\`) REFERENCES \`children\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`measures\` ADD CONSTRAINT \`FK_6c1969783f6de778fd6e18413bd\` FOREIGN KEY (\`startedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`measures\` ADD CONSTRAINT \`FK_46efc440e318ce4b7ab9e4d6e43\` FOREIGN KEY (\`lockedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`measures\` ADD CONSTRAINT \`FK_736212e41e6f759002829cec523\` FOREIGN KEY (\`replacesId\`) REFERENCES \`measures\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`questionnaire_responses\` ADD CONSTRAINT \`FK_83f0fc9cd415c56d866455b449f\` FOREIGN KEY (\`formVersion\`) REFERENCES \`questionnaire_forms\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`questionnaire_responses\` ADD CONSTRAINT \`FK_52e306d2704626c7e25e0c6d28e\` FOREIGN KEY (\`requestId\`) REFERENCES \`answer_requests\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`questionnaire_responses\` ADD CONSTRAINT \`FK_1e47a12ab3f77727479ff1c6da4\` FOREIGN KEY (\`guardianId\`) REFERENCES \`guardians\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
  `ALTER TABLE \`questionnaire_responses\` ADD CONSTRAINT \`FK_574fb9f7fc2238ca9fdabd9fcaf\` FOREIGN KEY (\`startedById\`) REFERENCES \`users\`(\`id\`) ON DELETE RESTRICT ON UPDATE RESTRICT`,
]

const dropped = [
  ['alerts', 'FK_f4418aa4e56050aa8f5296e68a8'],
  [
    'questionnaire_responses',
    'FK_83f0fc9cd415c56d866455b449f',
    'FK_52e306d2704626c7e25e0c6d28e',
    'FK_1e47a12ab3f77727479ff1c6da4',
  ],
] as const

const refuse = (why: string) => `SIGNAL SQLSTATE '45000' SET MESSAGE_TEXT = '${why}'`

const changed = (...names: string[]) => names.map((name) => `NOT (NEW.${name} <=> OLD.${name})`).join(' OR ')

/** Trigger name, moment and table, condition of refusal, words. */
const guards: [name: string, moment: string, condition: string | null, why: string][] = [
  [
    'questionnaire_forms_keep',
    'BEFORE UPDATE ON questionnaire_forms',
    changed('id', 'formKey', 'edition', 'definition', 'createdAt'),
    'an edition of a form is never changed',
  ],
  ['questionnaire_forms_stay', 'BEFORE DELETE ON questionnaire_forms', null, 'forms are never removed'],
  ['answer_requests_stay', 'BEFORE DELETE ON answer_requests', null, 'requests are never removed'],
  [
    'histories_keep',
    'BEFORE UPDATE ON histories',
    'OLD.lockedAt IS NOT NULL',
    'a history that was sent is closed',
  ],
  [
    'histories_stay',
    'BEFORE DELETE ON histories',
    'OLD.lockedAt IS NOT NULL',
    'a history that was sent is closed',
  ],
  ['measures_keep', 'BEFORE UPDATE ON measures', 'OLD.lockedAt IS NOT NULL', 'a locked measure is closed'],
  ['measures_stay', 'BEFORE DELETE ON measures', 'OLD.lockedAt IS NOT NULL', 'a locked measure is closed'],
  [
    'conclusions_keep',
    'BEFORE UPDATE ON conclusions',
    "OLD.state = 'signed'",
    'a signed conclusion is closed',
  ],
  [
    'conclusions_hold',
    'BEFORE UPDATE ON conclusions',
    `OLD.state = 'awaiting_countersignature' AND (NEW.state <> 'signed' OR ${changed('childId', 'authorId', 'content', 'evidence')})`,
    'a conclusion waiting for its countersignature is closed',
  ],
  [
    'conclusions_stay',
    'BEFORE DELETE ON conclusions',
    "OLD.state <> 'draft'",
    'a signed conclusion is closed',
  ],
]

const frozenMail = changed('kind', 'mimeSha256', 'messageId', 'recipient')
const isOver = "NEW.state IN ('sent', 'failed', 'cancelled')"
const bringsLink = "OLD.kind IN ('answer_request', 'invitation', 'password_reset')"

/**
 * An e-mail that brought a link forgets its bytes once it will not be sent (again): of the link's secret only the hash
 * stays. Nothing else of an e-mail changes, and one without bytes is never queued again.
 */
const forgettingMailGuard = `CREATE TRIGGER outbox_messages_keep BEFORE UPDATE ON outbox_messages FOR EACH ROW
  IF ${frozenMail}
    OR (NOT (NEW.mime <=> OLD.mime) AND NOT (NEW.mime = '' AND ${bringsLink} AND ${isOver}))
    OR (NEW.mime = '' AND NOT ${isOver})
  THEN ${refuse('a queued e-mail is never changed')}; END IF`

const unchangingMailGuard = `CREATE TRIGGER outbox_messages_keep BEFORE UPDATE ON outbox_messages FOR EACH ROW
  IF ${changed('mime', 'mimeSha256', 'messageId', 'recipient')}
  THEN ${refuse('a queued e-mail is never changed')}; END IF`

/** Names of the triggers; the boot checks that each is there. */
export const assessmentGuardNames = guards.map(([name]) => name)

/** Signs of referrals had names of their own; with those of the clinic's table one sign stands once. */
const flagsOfReferrals = [
  ['new_weakness', 'new-neurological-signs', 'same_day'],
  ['preference_before_12_months', 'preference-before-12-months', 'priority'],
  ['preference_12_to_18_months', 'preference-12-to-18-months', 'ask'],
  ['other_hand_little_used', 'other-hand-or-lost-skill', 'medical_review'],
  ['change_of_hand', 'change-of-hand', 'medical_review'],
  ['pain', 'pain', 'safeguarding'],
  ['pressure_to_switch', 'punished-for-hand', 'safeguarding'],
  ['swaps_from_six', 'swaps-within-task', 'ask'],
] as const

/** Forms as data, requests for answers, histories, measures, conclusions, and where a warning sign was seen. */
export class AddAssessment1764580000000 implements MigrationInterface {
  name = 'AddAssessment1764580000000'

  async up(runner: QueryRunner): Promise<void> {
    for (const statement of [...tables, ...columns]) await runner.query(statement)
    await runner.query(
      `UPDATE alerts SET origin = 'referral', holdsBooking = (level = 'overdue'),
         urgency = CASE level WHEN 'overdue' THEN 'medical_review' ELSE 'ask' END`,
    )
    for (const [was, flag, urgency] of flagsOfReferrals)
      await runner.query('UPDATE alerts SET flag = ?, urgency = ? WHERE flag = ?', [flag, urgency, was])
    for (const { key, edition, definition } of formsOfTheStart)
      await runner.query(
        `INSERT INTO questionnaire_forms (id, formKey, edition, definition, createdAt)
         VALUES (?, ?, ?, ?, '2025-12-01 00:00:00')`,
        [`${key}.v${edition}`, key, edition, JSON.stringify(definition)],
      )
    for (const statement of keys) await runner.query(statement)
    for (const [name, moment, condition, why] of guards) {
      const body = condition === null ? refuse(why) : `IF ${condition} THEN ${refuse(why)}; END IF`
      await runner.query(`CREATE TRIGGER ${name} ${moment} FOR EACH ROW ${body}`)
    }
    await runner.query('DROP TRIGGER outbox_messages_keep')
    await runner.query(forgettingMailGuard)
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('DROP TRIGGER outbox_messages_keep')
    await runner.query(unchangingMailGuard)
    for (const name of assessmentGuardNames) await runner.query(`DROP TRIGGER ${name}`)
    for (const [table, ...names] of dropped)
      for (const name of names) await runner.query(`ALTER TABLE ${table} DROP FOREIGN KEY ${name}`)
    await runner.query(
      'ALTER TABLE questionnaire_responses DROP COLUMN requestId, DROP COLUMN guardianId, MODIFY startedById uuid NOT NULL',
    )
    await runner.query(
      `ALTER TABLE alerts DROP COLUMN urgency, DROP COLUMN advice, DROP COLUMN origin, DROP COLUMN originId,
         DROP COLUMN holdsBooking, DROP COLUMN raisedById`,
    )
    await runner.query('DROP TABLE conclusions, measures, histories, answer_requests, questionnaire_forms')
  }
}
