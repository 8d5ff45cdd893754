import type { MigrationInterface, QueryRunner } from 'typeorm';

export class SceneGuessedRoles1796101200000 implements MigrationInterface {
  name = 'SceneGuessedRoles1796101200000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE `scenes` ADD COLUMN IF NOT EXISTS `guessedRoles` tinyint NOT NULL DEFAULT 0');
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE `scenes` DROP COLUMN `guessedRoles`');
  }
}
