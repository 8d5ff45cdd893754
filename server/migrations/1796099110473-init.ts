import type { MigrationInterface, QueryRunner } from 'typeorm';

export class Init1796099110473 implements MigrationInterface {
  name = 'Init1796099110473';

  public async up(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`users\` (
                \`id\` uuid NOT NULL,
                \`email\` varchar(254) NOT NULL,
                \`name\` varchar(120) NOT NULL,
                \`passwordHash\` varchar(255) NULL,
                \`siteAdmin\` tinyint NOT NULL DEFAULT 0,
                \`closedAt\` datetime(6) NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                UNIQUE INDEX \`IDX_97672ac88f789774dd47f7c8be\` (\`email\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`account_tokens\` (
                \`id\` uuid NOT NULL,
                \`secretSha256\` char(64) NOT NULL,
                \`userId\` uuid NOT NULL,
                \`purpose\` varchar(16) NOT NULL,
                \`expiresAt\` datetime(6) NOT NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                UNIQUE INDEX \`IDX_050907122a2f34e75b9071dc5d\` (\`secretSha256\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`projects\` (
                \`id\` uuid NOT NULL,
                \`name\` varchar(120) NOT NULL,
                \`client\` varchar(160) NOT NULL DEFAULT '',
                \`description\` text NOT NULL,
                \`studyArea\` geometry NULL,
                \`targetOverallAccuracy\` double NULL,
                \`targetSamplesPerClass\` int NULL,
                \`lastSampleNumber\` int NOT NULL DEFAULT '0',
                \`lastRunNumber\` int NOT NULL DEFAULT '0',
                \`version\` int NOT NULL DEFAULT '1',
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                \`updatedAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6) ON UPDATE CURRENT_TIMESTAMP(6),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`activities\` (
                \`id\` bigint NOT NULL AUTO_INCREMENT,
                \`projectId\` uuid NOT NULL,
                \`userId\` uuid NULL,
                \`text\` varchar(400) NOT NULL,
                \`path\` varchar(200) NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                INDEX \`IDX_bfb0bffaf2bf96eccee46bf3c7\` (\`projectId\`, \`createdAt\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`scenes\` (
                \`id\` uuid NOT NULL,
                \`projectId\` uuid NOT NULL,
                \`name\` varchar(160) NOT NULL,
                \`acquiredOn\` date NULL,
                \`state\` varchar(16) NOT NULL DEFAULT 'ingesting',
                \`failure\` json NULL,
                \`files\` json NOT NULL,
                \`width\` int NULL,
                \`height\` int NULL,
                \`originX\` double NULL,
                \`originY\` double NULL,
                \`pixelWidth\` double NULL,
                \`pixelHeight\` double NULL,
                \`crsName\` varchar(200) NULL,
                \`crsEpsg\` int NULL,
                \`crsProj4\` varchar(400) NULL,
                \`crsWkt\` text NULL,
                \`footprint\` geometry NULL,
                \`bounds\` json NULL,
                \`uploadedById\` uuid NULL,
                \`version\` int NOT NULL DEFAULT '1',
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                INDEX \`IDX_b29a6eaccc21ceb52b607e4f10\` (\`projectId\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`bands\` (
                \`id\` uuid NOT NULL,
                \`sceneId\` uuid NOT NULL,
                \`number\` int NOT NULL,
                \`name\` varchar(80) NOT NULL,
                \`role\` varchar(16) NOT NULL,
                \`centreWavelengthUm\` double NULL,
                \`gsdMeters\` double NULL,
                \`scale\` double NOT NULL DEFAULT '1',
                \`offset\` double NOT NULL DEFAULT '0',
                \`quantity\` varchar(16) NOT NULL DEFAULT 'digital number',
                \`nodata\` double NULL,
                \`dataType\` varchar(16) NOT NULL,
                \`width\` int NOT NULL,
                \`height\` int NOT NULL,
                \`originX\` double NOT NULL,
                \`originY\` double NOT NULL,
                \`pixelWidth\` double NOT NULL,
                \`pixelHeight\` double NOT NULL,
                \`statistics\` json NOT NULL,
                \`sha256\` char(64) NOT NULL,
                \`fileKey\` varchar(200) NOT NULL,
                INDEX \`IDX_d9cd5b6bccef974a8ef6e97aae\` (\`sceneId\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`event_entries\` (
                \`id\` bigint NOT NULL AUTO_INCREMENT,
                \`projectId\` uuid NOT NULL,
                \`event\` json NOT NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                INDEX \`IDX_17b2199329dc018e3a0df8d06a\` (\`projectId\`),
                INDEX \`IDX_43329a9813519f8f60283d5fc5\` (\`createdAt\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`jobs\` (
                \`id\` uuid NOT NULL,
                \`kind\` varchar(16) NOT NULL,
                \`projectId\` uuid NOT NULL,
                \`sceneId\` uuid NULL,
                \`runId\` uuid NULL,
                \`state\` varchar(16) NOT NULL DEFAULT 'queued',
                \`step\` varchar(120) NOT NULL DEFAULT '',
                \`done\` double NOT NULL DEFAULT '0',
                \`total\` double NOT NULL DEFAULT '0',
                \`share\` double NOT NULL DEFAULT '0',
                \`secondsLeft\` double NULL,
                \`error\` text NULL,
                \`cancelAsked\` tinyint NOT NULL DEFAULT 0,
                \`attempts\` int NOT NULL DEFAULT '0',
                \`owner\` varchar(64) NULL,
                \`heartbeatAt\` datetime(6) NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                \`startedAt\` datetime(6) NULL,
                \`endedAt\` datetime(6) NULL,
                INDEX \`IDX_0109dd9e3af90efa9ab35cdb29\` (\`projectId\`),
                INDEX \`IDX_273ca3806896bf4b28022d84b9\` (\`state\`, \`createdAt\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`land_classes\` (
                \`id\` uuid NOT NULL,
                \`projectId\` uuid NOT NULL,
                \`code\` int NOT NULL,
                \`name\` varchar(80) NOT NULL,
                \`colour\` char(7) NOT NULL,
                \`definition\` text NOT NULL,
                \`position\` int NOT NULL,
                \`version\` int NOT NULL DEFAULT '1',
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                UNIQUE INDEX \`IDX_2e296e9bfbd9f54a3c0f19e2fb\` (\`projectId\`, \`code\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`memberships\` (
                \`id\` uuid NOT NULL,
                \`projectId\` uuid NOT NULL,
                \`userId\` uuid NOT NULL,
                \`roles\` text NOT NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                UNIQUE INDEX \`IDX_49dede8597707aaf7a7f3a5971\` (\`projectId\`, \`userId\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`rate_counters\` (
                \`key\` varchar(191) NOT NULL,
                \`hits\` int UNSIGNED NOT NULL,
                \`resetAt\` datetime(6) NOT NULL,
                PRIMARY KEY (\`key\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`runs\` (
                \`id\` uuid NOT NULL,
                \`projectId\` uuid NOT NULL,
                \`number\` int NOT NULL,
                \`name\` varchar(120) NOT NULL,
                \`note\` text NOT NULL,
                \`sceneId\` uuid NOT NULL,
                \`recipe\` json NOT NULL,
                \`classes\` json NOT NULL,
                \`inputSha256\` char(64) NOT NULL,
                \`jobId\` uuid NOT NULL,
                \`result\` json NULL,
                \`startedById\` uuid NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                UNIQUE INDEX \`IDX_e26b3368b768d4b13b6d96218c\` (\`projectId\`, \`number\`),
                UNIQUE INDEX \`REL_fb4499f5fe8e0a93856b419ba3\` (\`jobId\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`run_samples\` (
                \`runId\` uuid NOT NULL,
                \`sampleId\` uuid NOT NULL,
                \`sampleNumber\` int NOT NULL,
                \`sampleVersion\` int NOT NULL,
                \`part\` varchar(8) NOT NULL,
                \`classId\` uuid NOT NULL,
                \`geometry\` polygon NOT NULL,
                \`mappedPixels\` json NULL,
                PRIMARY KEY (\`runId\`, \`sampleId\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`samples\` (
                \`id\` uuid NOT NULL,
                \`projectId\` uuid NOT NULL,
                \`number\` int NOT NULL,
                \`sceneId\` uuid NOT NULL,
                \`classId\` uuid NOT NULL,
                \`geometry\` polygon NOT NULL,
                \`confidence\` varchar(8) NOT NULL,
                \`note\` text NOT NULL,
                \`pixelCount\` int NOT NULL,
                \`areaHa\` double NOT NULL,
                \`version\` int NOT NULL DEFAULT '1',
                \`createdById\` uuid NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                \`updatedAt\` datetime(6) NOT NULL,
                \`deletedAt\` datetime(6) NULL,
                SPATIAL INDEX \`IDX_35c43d233f1c9d935c8dd19779\` (\`geometry\`),
                INDEX \`IDX_b5f6f7df27f1fa1daded8954a9\` (\`projectId\`, \`deletedAt\`),
                UNIQUE INDEX \`IDX_f8371fb37ca97af3e7792b1424\` (\`projectId\`, \`number\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`sample_versions\` (
                \`id\` uuid NOT NULL,
                \`sampleId\` uuid NOT NULL,
                \`versionNumber\` int NOT NULL,
                \`change\` varchar(16) NOT NULL,
                \`classId\` uuid NOT NULL,
                \`geometry\` polygon NOT NULL,
                \`confidence\` varchar(8) NOT NULL,
                \`note\` text NOT NULL,
                \`pixelCount\` int NOT NULL,
                \`areaHa\` double NOT NULL,
                \`byId\` uuid NULL,
                \`createdAt\` datetime(6) NOT NULL DEFAULT CURRENT_TIMESTAMP(6),
                UNIQUE INDEX \`IDX_5403e9da1c2e8b8d6b50043958\` (\`sampleId\`, \`versionNumber\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            CREATE TABLE IF NOT EXISTS \`sessions\` (
                \`id\` varchar(128) NOT NULL,
                \`userId\` uuid NULL,
                \`data\` text NOT NULL,
                \`userAgent\` varchar(400) NOT NULL DEFAULT '',
                \`address\` varchar(64) NOT NULL DEFAULT '',
                \`lastSeenAt\` datetime(6) NOT NULL,
                \`expiresAt\` datetime(6) NOT NULL,
                INDEX \`IDX_57de40bc620f456c7311aa3a1e\` (\`userId\`),
                INDEX \`IDX_50762206f116cd47d1c3fec396\` (\`expiresAt\`),
                PRIMARY KEY (\`id\`)
            ) ENGINE = InnoDB
        `);
    await queryRunner.query(`
            ALTER TABLE \`account_tokens\`
            ADD CONSTRAINT \`FK_c846ac09be5a5f4feeb7314469f\` FOREIGN KEY IF NOT EXISTS (\`userId\`) REFERENCES \`users\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`activities\`
            ADD CONSTRAINT \`FK_e67cee936823900fc4d5f3feb14\` FOREIGN KEY IF NOT EXISTS (\`projectId\`) REFERENCES \`projects\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`activities\`
            ADD CONSTRAINT \`FK_5a2cfe6f705df945b20c1b22c71\` FOREIGN KEY IF NOT EXISTS (\`userId\`) REFERENCES \`users\`(\`id\`) ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`scenes\`
            ADD CONSTRAINT \`FK_b29a6eaccc21ceb52b607e4f10e\` FOREIGN KEY IF NOT EXISTS (\`projectId\`) REFERENCES \`projects\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`scenes\`
            ADD CONSTRAINT \`FK_84bfd998fa08422ea41e52a91f9\` FOREIGN KEY IF NOT EXISTS (\`uploadedById\`) REFERENCES \`users\`(\`id\`) ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`bands\`
            ADD CONSTRAINT \`FK_d9cd5b6bccef974a8ef6e97aaec\` FOREIGN KEY IF NOT EXISTS (\`sceneId\`) REFERENCES \`scenes\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`land_classes\`
            ADD CONSTRAINT \`FK_d8cbf67ac801f743d0d99ea28be\` FOREIGN KEY IF NOT EXISTS (\`projectId\`) REFERENCES \`projects\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`memberships\`
            ADD CONSTRAINT \`FK_d6a1fdafcd15c76b47bca6dec53\` FOREIGN KEY IF NOT EXISTS (\`projectId\`) REFERENCES \`projects\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`memberships\`
            ADD CONSTRAINT \`FK_187d573e43b2c2aa3960df20b78\` FOREIGN KEY IF NOT EXISTS (\`userId\`) REFERENCES \`users\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\`
            ADD CONSTRAINT \`FK_7adfbd2736d6714533f8b30375f\` FOREIGN KEY IF NOT EXISTS (\`projectId\`) REFERENCES \`projects\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\`
            ADD CONSTRAINT \`FK_1ce29c071fa4dcd3e92097a81dd\` FOREIGN KEY IF NOT EXISTS (\`sceneId\`) REFERENCES \`scenes\`(\`id\`) ON DELETE RESTRICT ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\`
            ADD CONSTRAINT \`FK_fb4499f5fe8e0a93856b419ba39\` FOREIGN KEY IF NOT EXISTS (\`jobId\`) REFERENCES \`jobs\`(\`id\`) ON DELETE RESTRICT ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\`
            ADD CONSTRAINT \`FK_adc4d79960dfdeaa2573414e02f\` FOREIGN KEY IF NOT EXISTS (\`startedById\`) REFERENCES \`users\`(\`id\`) ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`run_samples\`
            ADD CONSTRAINT \`FK_9bf738559173fc92432090178ee\` FOREIGN KEY IF NOT EXISTS (\`runId\`) REFERENCES \`runs\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\`
            ADD CONSTRAINT \`FK_86e29d8c6c2335708a77da185e1\` FOREIGN KEY IF NOT EXISTS (\`projectId\`) REFERENCES \`projects\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\`
            ADD CONSTRAINT \`FK_901b1f1918681274d5274268611\` FOREIGN KEY IF NOT EXISTS (\`sceneId\`) REFERENCES \`scenes\`(\`id\`) ON DELETE RESTRICT ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\`
            ADD CONSTRAINT \`FK_e96dfaedb9a69f2cf6dedc48631\` FOREIGN KEY IF NOT EXISTS (\`classId\`) REFERENCES \`land_classes\`(\`id\`) ON DELETE RESTRICT ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\`
            ADD CONSTRAINT \`FK_f74a2cbd17cee09771082c3350e\` FOREIGN KEY IF NOT EXISTS (\`createdById\`) REFERENCES \`users\`(\`id\`) ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`sample_versions\`
            ADD CONSTRAINT \`FK_a7b9519cba48430e3423184981e\` FOREIGN KEY IF NOT EXISTS (\`sampleId\`) REFERENCES \`samples\`(\`id\`) ON DELETE CASCADE ON UPDATE NO ACTION
        `);
    await queryRunner.query(`
            ALTER TABLE \`sample_versions\`
            ADD CONSTRAINT \`FK_d60b3cf535b5bae35415fa261f3\` FOREIGN KEY IF NOT EXISTS (\`byId\`) REFERENCES \`users\`(\`id\`) ON DELETE
            SET NULL ON UPDATE NO ACTION
        `);
  }

  public async down(queryRunner: QueryRunner): Promise<void> {
    await queryRunner.query(`
            ALTER TABLE \`sample_versions\` DROP FOREIGN KEY \`FK_d60b3cf535b5bae35415fa261f3\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`sample_versions\` DROP FOREIGN KEY \`FK_a7b9519cba48430e3423184981e\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\` DROP FOREIGN KEY \`FK_f74a2cbd17cee09771082c3350e\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\` DROP FOREIGN KEY \`FK_e96dfaedb9a69f2cf6dedc48631\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\` DROP FOREIGN KEY \`FK_901b1f1918681274d5274268611\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`samples\` DROP FOREIGN KEY \`FK_86e29d8c6c2335708a77da185e1\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`run_samples\` DROP FOREIGN KEY \`FK_9bf738559173fc92432090178ee\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\` DROP FOREIGN KEY \`FK_adc4d79960dfdeaa2573414e02f\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\` DROP FOREIGN KEY \`FK_fb4499f5fe8e0a93856b419ba39\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\` DROP FOREIGN KEY \`FK_1ce29c071fa4dcd3e92097a81dd\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`runs\` DROP FOREIGN KEY \`FK_7adfbd2736d6714533f8b30375f\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`memberships\` DROP FOREIGN KEY \`FK_187d573e43b2c2aa3960df20b78\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`memberships\` DROP FOREIGN KEY \`FK_d6a1fdafcd15c76b47bca6dec53\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`land_classes\` DROP FOREIGN KEY \`FK_d8cbf67ac801f743d0d99ea28be\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`bands\` DROP FOREIGN KEY \`FK_d9cd5b6bccef974a8ef6e97aaec\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`scenes\` DROP FOREIGN KEY \`FK_84bfd998fa08422ea41e52a91f9\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`scenes\` DROP FOREIGN KEY \`FK_b29a6eaccc21ceb52b607e4f10e\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`activities\` DROP FOREIGN KEY \`FK_5a2cfe6f705df945b20c1b22c71\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`activities\` DROP FOREIGN KEY \`FK_e67cee936823900fc4d5f3feb14\`
        `);
    await queryRunner.query(`
            ALTER TABLE \`account_tokens\` DROP FOREIGN KEY \`FK_c846ac09be5a5f4feeb7314469f\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_50762206f116cd47d1c3fec396\` ON \`sessions\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_57de40bc620f456c7311aa3a1e\` ON \`sessions\`
        `);
    await queryRunner.query(`
            DROP TABLE \`sessions\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_5403e9da1c2e8b8d6b50043958\` ON \`sample_versions\`
        `);
    await queryRunner.query(`
            DROP TABLE \`sample_versions\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_f8371fb37ca97af3e7792b1424\` ON \`samples\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_b5f6f7df27f1fa1daded8954a9\` ON \`samples\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_35c43d233f1c9d935c8dd19779\` ON \`samples\`
        `);
    await queryRunner.query(`
            DROP TABLE \`samples\`
        `);
    await queryRunner.query(`
            DROP TABLE \`run_samples\`
        `);
    await queryRunner.query(`
            DROP INDEX \`REL_fb4499f5fe8e0a93856b419ba3\` ON \`runs\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_e26b3368b768d4b13b6d96218c\` ON \`runs\`
        `);
    await queryRunner.query(`
            DROP TABLE \`runs\`
        `);
    await queryRunner.query(`
            DROP TABLE \`rate_counters\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_49dede8597707aaf7a7f3a5971\` ON \`memberships\`
        `);
    await queryRunner.query(`
            DROP TABLE \`memberships\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_2e296e9bfbd9f54a3c0f19e2fb\` ON \`land_classes\`
        `);
    await queryRunner.query(`
            DROP TABLE \`land_classes\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_273ca3806896bf4b28022d84b9\` ON \`jobs\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_0109dd9e3af90efa9ab35cdb29\` ON \`jobs\`
        `);
    await queryRunner.query(`
            DROP TABLE \`jobs\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_43329a9813519f8f60283d5fc5\` ON \`event_entries\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_17b2199329dc018e3a0df8d06a\` ON \`event_entries\`
        `);
    await queryRunner.query(`
            DROP TABLE \`event_entries\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_d9cd5b6bccef974a8ef6e97aae\` ON \`bands\`
        `);
    await queryRunner.query(`
            DROP TABLE \`bands\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_b29a6eaccc21ceb52b607e4f10\` ON \`scenes\`
        `);
    await queryRunner.query(`
            DROP TABLE \`scenes\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_bfb0bffaf2bf96eccee46bf3c7\` ON \`activities\`
        `);
    await queryRunner.query(`
            DROP TABLE \`activities\`
        `);
    await queryRunner.query(`
            DROP TABLE \`projects\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_050907122a2f34e75b9071dc5d\` ON \`account_tokens\`
        `);
    await queryRunner.query(`
            DROP TABLE \`account_tokens\`
        `);
    await queryRunner.query(`
            DROP INDEX \`IDX_97672ac88f789774dd47f7c8be\` ON \`users\`
        `);
    await queryRunner.query(`
            DROP TABLE \`users\`
        `);
  }
}
