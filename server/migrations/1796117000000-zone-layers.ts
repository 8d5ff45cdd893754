import type { MigrationInterface, QueryRunner } from 'typeorm';

export class ZoneLayers1796117000000 implements MigrationInterface {
  name = 'ZoneLayers1796117000000';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `zone_layers` (`id` uuid NOT NULL, `projectId` uuid NOT NULL, `name` varchar(120) NOT NULL, `zones` json NOT NULL, `createdById` uuid NULL, `createdAt` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6), PRIMARY KEY (`id`)) ENGINE=InnoDB',
    );
    await queryRunner.query(
      'ALTER TABLE `zone_layers` ADD CONSTRAINT `FK_zone_layer_project` FOREIGN KEY IF NOT EXISTS `FK_zone_layer_project` (`projectId`) REFERENCES `projects`(`id`) ON DELETE CASCADE ON UPDATE NO ACTION',
    );
    await queryRunner.query(
      'ALTER TABLE `zone_layers` ADD CONSTRAINT `FK_zone_layer_creator` FOREIGN KEY IF NOT EXISTS `FK_zone_layer_creator` (`createdById`) REFERENCES `users`(`id`) ON DELETE SET NULL ON UPDATE NO ACTION',
    );
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE `zone_layers`');
  }
}
