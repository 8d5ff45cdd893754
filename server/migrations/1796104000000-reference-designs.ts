import type { MigrationInterface, QueryRunner } from 'typeorm';

export class ReferenceDesigns1796104000000 implements MigrationInterface {
  name = 'ReferenceDesigns1796104000000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `reference_designs` (`id` uuid NOT NULL, `projectId` uuid NOT NULL, `runId` uuid NOT NULL, `number` int NOT NULL, `name` varchar(120) NOT NULL, `state` varchar(16) NOT NULL, `plan` json NOT NULL, `strata` json NOT NULL, `classes` json NOT NULL, `seed` int UNSIGNED NOT NULL, `minSpacingMeters` double NOT NULL, `leftOutBySpacing` json NOT NULL, `answersPerPoint` int NOT NULL, `digest` char(64) NULL, `augmentsId` uuid NULL, `createdById` uuid NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), `openedAt` datetime(6) NULL, `closedAt` datetime(6) NULL, UNIQUE INDEX `UQ_reference_design_number` (`projectId`, `number`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `reference_points` (`id` uuid NOT NULL, `designId` uuid NOT NULL, `number` int NOT NULL, `stratum` int NOT NULL, `drawOrder` int NOT NULL, `pixelRow` int NOT NULL, `pixelColumn` int NOT NULL, `lon` double NOT NULL, `lat` double NOT NULL, `mappedCode` int NOT NULL, `isCarried` tinyint NOT NULL DEFAULT 0, `decisionClassId` uuid NULL, `decisionAlternateClassId` uuid NULL, `decisionNote` text NOT NULL, `decidedById` uuid NULL, `decidedAt` datetime(6) NULL, UNIQUE INDEX `UQ_reference_point_number` (`designId`, `number`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `reference_answers` (`id` uuid NOT NULL, `pointId` uuid NOT NULL, `userId` uuid NULL, `classId` uuid NULL, `alternateClassId` uuid NULL, `confidence` varchar(8) NOT NULL, `note` text NOT NULL, `source` varchar(8) NOT NULL, `seconds` double NULL, `answeredAt` datetime(6) NOT NULL, UNIQUE INDEX `UQ_reference_answer_user` (`pointId`, `userId`), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    await queryRunner.query(
      'ALTER TABLE `reference_designs` ADD CONSTRAINT `FK_reference_design_project` FOREIGN KEY IF NOT EXISTS `FK_reference_design_project` (`projectId`) REFERENCES `projects`(`id`) ON DELETE CASCADE ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE `reference_designs` ADD CONSTRAINT `FK_reference_design_run` FOREIGN KEY IF NOT EXISTS `FK_reference_design_run` (`runId`) REFERENCES `runs`(`id`) ON DELETE CASCADE ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE `reference_designs` ADD CONSTRAINT `FK_reference_design_creator` FOREIGN KEY IF NOT EXISTS `FK_reference_design_creator` (`createdById`) REFERENCES `users`(`id`) ON DELETE SET NULL ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE `reference_points` ADD CONSTRAINT `FK_reference_point_design` FOREIGN KEY IF NOT EXISTS `FK_reference_point_design` (`designId`) REFERENCES `reference_designs`(`id`) ON DELETE CASCADE ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE `reference_points` ADD CONSTRAINT `FK_reference_point_decider` FOREIGN KEY IF NOT EXISTS `FK_reference_point_decider` (`decidedById`) REFERENCES `users`(`id`) ON DELETE SET NULL ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE `reference_answers` ADD CONSTRAINT `FK_reference_answer_point` FOREIGN KEY IF NOT EXISTS `FK_reference_answer_point` (`pointId`) REFERENCES `reference_points`(`id`) ON DELETE CASCADE ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE `reference_answers` ADD CONSTRAINT `FK_reference_answer_user` FOREIGN KEY IF NOT EXISTS `FK_reference_answer_user` (`userId`) REFERENCES `users`(`id`) ON DELETE SET NULL ON UPDATE NO ACTION',
    );
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE `reference_answers`');
    await queryRunner.query('DROP TABLE `reference_points`');
    await queryRunner.query('DROP TABLE `reference_designs`');
  }
}
