import type { MigrationInterface, QueryRunner } from 'typeorm';

const foreignKey = (table: string, name: string, column: string, target: string, onDelete: string) =>
  `ALTER TABLE \`${table}\` ADD CONSTRAINT \`${name}\` FOREIGN KEY IF NOT EXISTS \`${name}\` (\`${column}\`) REFERENCES \`${target}\`(\`id\`) ON DELETE ${onDelete} ON UPDATE NO ACTION`;

export class ReviewAndBlocks1796118600000 implements MigrationInterface {
  name = 'ReviewAndBlocks1796118600000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    for (const statement of [
      'CREATE TABLE IF NOT EXISTS `blocks` (`id` uuid NOT NULL, `projectId` uuid NOT NULL, `number` int NOT NULL, `name` varchar(40) NOT NULL, `geometry` polygon NOT NULL, `areaHa` double NOT NULL, `targetPerClass` int NULL, `checkedAt` datetime(6) NULL, `agreement` json NULL, `version` int NOT NULL DEFAULT 1, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), PRIMARY KEY (`id`)) ENGINE=InnoDB',
      foreignKey('blocks', 'FK_block_project', 'projectId', 'projects', 'CASCADE'),
      'CREATE TABLE IF NOT EXISTS `block_assignments` (`blockId` uuid NOT NULL, `userId` uuid NOT NULL, `doneAt` datetime(6) NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), PRIMARY KEY (`blockId`, `userId`)) ENGINE=InnoDB',
      foreignKey('block_assignments', 'FK_block_assignment_block', 'blockId', 'blocks', 'CASCADE'),
      foreignKey('block_assignments', 'FK_block_assignment_user', 'userId', 'users', 'CASCADE'),
      "ALTER TABLE `samples` ADD COLUMN IF NOT EXISTS `state` varchar(12) NOT NULL DEFAULT 'draft'",
      'ALTER TABLE `samples` ADD COLUMN IF NOT EXISTS `blockId` uuid NULL',
      'ALTER TABLE `samples` ADD COLUMN IF NOT EXISTS `openRemarks` int NOT NULL DEFAULT 0',
      foreignKey('samples', 'FK_sample_block', 'blockId', 'blocks', 'SET NULL'),
      'CREATE TABLE IF NOT EXISTS `sample_remarks` (`id` uuid NOT NULL, `sampleId` uuid NOT NULL, `kind` varchar(32) NOT NULL, `text` text NOT NULL, `byId` uuid NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), `resolvedAt` datetime(6) NULL, `resolvedById` uuid NULL, PRIMARY KEY (`id`)) ENGINE=InnoDB',
      foreignKey('sample_remarks', 'FK_sample_remark_sample', 'sampleId', 'samples', 'CASCADE'),
      foreignKey('sample_remarks', 'FK_sample_remark_by', 'byId', 'users', 'SET NULL'),
      foreignKey('sample_remarks', 'FK_sample_remark_resolver', 'resolvedById', 'users', 'SET NULL'),
      'CREATE TABLE IF NOT EXISTS `presences` (`deskId` uuid NOT NULL, `projectId` uuid NOT NULL, `userId` uuid NOT NULL, `editingSampleId` uuid NULL, `seenAt` datetime(6) NOT NULL, PRIMARY KEY (`deskId`)) ENGINE=InnoDB',
      foreignKey('presences', 'FK_presence_project', 'projectId', 'projects', 'CASCADE'),
      foreignKey('presences', 'FK_presence_user', 'userId', 'users', 'CASCADE'),
    ]) {
      await queryRunner.query(statement);
    }
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE `presences`');
    await queryRunner.query('DROP TABLE `sample_remarks`');
    await queryRunner.query('ALTER TABLE `samples` DROP FOREIGN KEY `FK_sample_block`');
    await queryRunner.query(
      'ALTER TABLE `samples` DROP COLUMN `openRemarks`, DROP COLUMN `blockId`, DROP COLUMN `state`',
    );
    await queryRunner.query('DROP TABLE `block_assignments`');
    await queryRunner.query('DROP TABLE `blocks`');
  }
}
