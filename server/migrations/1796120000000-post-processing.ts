import type { MigrationInterface, QueryRunner } from 'typeorm';

export class PostProcessing1796120000000 implements MigrationInterface {
  name = 'PostProcessing1796120000000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `post_processing_revisions` (`id` uuid NOT NULL, `runId` uuid NOT NULL, `number` int NOT NULL, `steps` json NOT NULL, `effects` json NOT NULL, `jobId` uuid NULL, `madeById` uuid NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), UNIQUE INDEX `UQ_post_processing_number` (`runId`, `number`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    for (const [name, column, other, onDelete] of FOREIGN_KEYS) {
      await queryRunner.query(
        `ALTER TABLE \`post_processing_revisions\` ADD CONSTRAINT \`${name}\` FOREIGN KEY IF NOT EXISTS \`${name}\` (\`${column}\`) REFERENCES \`${other}\`(\`id\`) ON DELETE ${onDelete} ON UPDATE NO ACTION`,
      );
    }
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE IF EXISTS `post_processing_revisions`');
  }
}

const FOREIGN_KEYS = [
  ['FK_post_processing_run', 'runId', 'runs', 'CASCADE'],
  ['FK_post_processing_job', 'jobId', 'jobs', 'SET NULL'],
  ['FK_post_processing_user', 'madeById', 'users', 'SET NULL'],
] as const;
