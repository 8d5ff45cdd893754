import 'reflect-metadata';
import type { DataSource } from 'typeorm';
import type { Config } from './config.ts';
import { AccountToken } from './entities/account-token.ts';
import { Activity } from './entities/activity.ts';
import { Band } from './entities/band.ts';
import { BlockAssignment } from './entities/block-assignment.ts';
import { Block } from './entities/block.ts';
import { EventEntry } from './entities/event-entry.ts';
import { JobLogEntry } from './entities/job-log-entry.ts';
import { Job } from './entities/job.ts';
import { LandClass } from './entities/land-class.ts';
import { Membership } from './entities/membership.ts';
import { NamedRecipe } from './entities/named-recipe.ts';
import { Presence } from './entities/presence.ts';
import { PostProcessingRevision } from './entities/post-processing-revision.ts';
import { Project } from './entities/project.ts';
import { RateCounter } from './entities/rate-counter.ts';
import { ReferenceAnswer } from './entities/reference-answer.ts';
import { ReferenceDesign } from './entities/reference-design.ts';
import { ReferencePoint } from './entities/reference-point.ts';
import { Reproduction } from './entities/reproduction.ts';
import { RunSample } from './entities/run-sample.ts';
import { Run } from './entities/run.ts';
import { SampleRemark } from './entities/sample-remark.ts';
import { SampleVersion } from './entities/sample-version.ts';
import { Sample } from './entities/sample.ts';
import { Scene } from './entities/scene.ts';
import { Session } from './entities/session.ts';
import { SiteSetting } from './entities/site-setting.ts';
import { Tuning } from './entities/tuning.ts';
import { User } from './entities/user.ts';
import { ZoneLayer } from './entities/zone-layer.ts';
import { migrations } from './migrations/index.ts';
import { RetryingDataSource } from './retrying-data-source.ts';

export const entities = [
  AccountToken,
  Activity,
  Band,
  Block,
  BlockAssignment,
  EventEntry,
  Job,
  JobLogEntry,
  LandClass,
  Membership,
  NamedRecipe,
  Presence,
  PostProcessingRevision,
  Project,
  RateCounter,
  ReferenceAnswer,
  ReferenceDesign,
  ReferencePoint,
  Reproduction,
  Run,
  RunSample,
  Sample,
  SampleRemark,
  SampleVersion,
  Scene,
  Session,
  SiteSetting,
  Tuning,
  User,
  ZoneLayer,
];

/** A MariaDB connection pool with our entities; the schema comes from migrations only. Call `initialize()`. */
export function createDataSource(db: Config['db']): DataSource {
  return new RetryingDataSource({
    type: 'mariadb',
    host: db.host,
    port: db.port,
    username: db.user,
    password: db.password,
    database: db.name,
    charset: 'utf8mb4_unicode_ci',
    timezone: 'Z',
    synchronize: false,
    entities,
    migrations,
    // A joined findOne would wrap its columns, JSON and all, in a DISTINCT that MariaDB works out on disk.
    relationLoadStrategy: 'query',
    poolSize: 12,
  });
}
