import type { MigrationInterface, QueryRunner } from 'typeorm'

/** Why a goal ended is part of the record, beside how it ended. */
export class AddGoalEndReason1764547500000 implements MigrationInterface {
  name = 'AddGoalEndReason1764547500000'

  async up(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE `goals` ADD `endReason` varchar(300) NULL')
  }

  async down(runner: QueryRunner): Promise<void> {
    await runner.query('ALTER TABLE `goals` DROP COLUMN `endReason`')
  }
}
