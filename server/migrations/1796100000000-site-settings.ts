import type { MigrationInterface, QueryRunner } from 'typeorm';

export class SiteSettings1796100000000 implements MigrationInterface {
  name = 'SiteSettings1796100000000';

  async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(
      'CREATE TABLE IF NOT EXISTS `site_settings` (`name` varchar(60) NOT NULL, `value` varchar(200) NOT NULL, PRIMARY KEY (`name`)) ENGINE = InnoDB',
    );
  }

  async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query('DROP TABLE `site_settings`');
  }
}
