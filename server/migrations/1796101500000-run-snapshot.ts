import type { MigrationInterface, QueryRunner } from 'typeorm';

export class RunSnapshot1796101500000 implements MigrationInterface {
  name = 'RunSnapshot1796101500000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE `runs` ADD COLUMN IF NOT EXISTS `studyArea` geometry NULL');
    // A default, so that runs made before get an empty list.
    await queryRunner.query("ALTER TABLE `runs` ADD COLUMN IF NOT EXISTS `warnings` json NOT NULL DEFAULT '[]'");
    await queryRunner.query('ALTER TABLE `runs` ALTER COLUMN `warnings` DROP DEFAULT');
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE `runs` DROP COLUMN `warnings`');
    await queryRunner.query('ALTER TABLE `runs` DROP COLUMN `studyArea`');
  }
}
