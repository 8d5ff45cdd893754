import type { MigrationInterface, QueryRunner } from 'typeorm';

export class QueueAndRecipes1796118000000 implements MigrationInterface {
  name = 'QueueAndRecipes1796118000000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('ALTER TABLE `jobs` ADD COLUMN IF NOT EXISTS `subjectId` uuid NULL');
    await queryRunner.query(
      "ALTER TABLE `jobs` ADD COLUMN IF NOT EXISTS `priority` varchar(8) NOT NULL DEFAULT 'normal'",
    );
    await queryRunner.query('ALTER TABLE `jobs` ADD COLUMN IF NOT EXISTS `place` int NULL');
    await queryRunner.query('ALTER TABLE `users` ADD COLUMN IF NOT EXISTS `mailsRunEnd` tinyint NOT NULL DEFAULT 1');
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `job_logs` (`id` bigint NOT NULL AUTO_INCREMENT, `jobId` uuid NOT NULL, `at` datetime(6) NOT NULL, `level` varchar(8) NOT NULL, `text` text NOT NULL, INDEX `IDX_job_log_job` (`jobId`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `reproductions` (`id` uuid NOT NULL, `runId` uuid NOT NULL, `jobId` uuid NULL, `verdict` varchar(12) NULL, `checks` json NOT NULL, `missing` json NOT NULL, `threads` int NOT NULL, `seconds` double NULL, `askedById` uuid NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), INDEX `IDX_reproduction_run` (`runId`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `named_recipes` (`id` uuid NOT NULL, `projectId` uuid NOT NULL, `name` varchar(120) NOT NULL, `note` text NOT NULL, `recipe` json NOT NULL, `createdById` uuid NULL, `version` int NOT NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), `updatedAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6) ON UPDATE CURRENT_TIMESTAMP(6), UNIQUE INDEX `UQ_named_recipe_name` (`projectId`, `name`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `tunings` (`id` uuid NOT NULL, `projectId` uuid NOT NULL, `name` varchar(120) NOT NULL, `recipe` json NOT NULL, `plan` json NOT NULL, `classes` json NOT NULL, `studyArea` geometry NULL, `samples` json NOT NULL, `notes` json NOT NULL, `trials` json NOT NULL, `jobId` uuid NULL, `startedById` uuid NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), INDEX `IDX_tuning_project` (`projectId`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    for (const [table, name, column, other, onDelete] of FOREIGN_KEYS) {
      await queryRunner.query(
        `ALTER TABLE \`${table}\` ADD CONSTRAINT \`${name}\` FOREIGN KEY IF NOT EXISTS \`${name}\` (\`${column}\`) REFERENCES \`${other}\`(\`id\`) ON DELETE ${onDelete} ON UPDATE NO ACTION`,
      );
    }
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    for (const table of ['tunings', 'named_recipes', 'reproductions', 'job_logs']) {
      await queryRunner.query(`DROP TABLE IF EXISTS \`${table}\``);
    }
    await queryRunner.query('ALTER TABLE `users` DROP COLUMN IF EXISTS `mailsRunEnd`');
    for (const column of ['place', 'priority', 'subjectId']) {
      await queryRunner.query(`ALTER TABLE \`jobs\` DROP COLUMN IF EXISTS \`${column}\``);
    }
  }
}

/** Table, name, column, table it points to, what becomes of the row when that goes. */
const FOREIGN_KEYS = [
  ['job_logs', 'FK_job_log_job', 'jobId', 'jobs', 'CASCADE'],
  ['reproductions', 'FK_reproduction_run', 'runId', 'runs', 'CASCADE'],
  ['reproductions', 'FK_reproduction_job', 'jobId', 'jobs', 'SET NULL'],
  ['reproductions', 'FK_reproduction_user', 'askedById', 'users', 'SET NULL'],
  ['named_recipes', 'FK_named_recipe_project', 'projectId', 'projects', 'CASCADE'],
  ['named_recipes', 'FK_named_recipe_user', 'createdById', 'users', 'SET NULL'],
  ['tunings', 'FK_tuning_project', 'projectId', 'projects', 'CASCADE'],
  ['tunings', 'FK_tuning_job', 'jobId', 'jobs', 'SET NULL'],
  ['tunings', 'FK_tuning_user', 'startedById', 'users', 'SET NULL'],
] as const;
