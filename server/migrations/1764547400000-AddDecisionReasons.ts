import type { MigrationInterface, QueryRunner } from 'typeorm'

/** What a referral was turned into when it was not accepted, why a carer is restricted, why a therapist's hold ended. */
export class AddDecisionReasons1764547400000 implements MigrationInterface {
  name = 'AddDecisionReasons1764547400000'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE `referrals` ADD `outcome` varchar(20) NULL')
    await runner.query('ALTER TABLE `guardians` ADD `restrictedReason` varchar(500) NULL')
    await runner.query('ALTER TABLE `assignments` ADD `endReason` varchar(500) NULL')
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE `assignments` DROP COLUMN `endReason`')
    await runner.query('ALTER TABLE `guardians` DROP COLUMN `restrictedReason`')
    await runner.query('ALTER TABLE `referrals` DROP COLUMN `outcome`')
  }
}
