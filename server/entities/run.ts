import {
  Column,
  CreateDateColumn,
  Entity,
  JoinColumn,
  ManyToOne,
  OneToOne,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';
import type { ArealGeometry } from '../../shared/contracts/geometry.ts';
import type { Recipe, RunLayer } from '../../shared/contracts/run.ts';
import { geometryTransformer } from './geometry-column.ts';
import { Job } from './job.ts';
import { Project } from './project.ts';
import { Scene } from './scene.ts';
import { User } from './user.ts';

export interface RunClass {
  id: string;
  code: number;
  name: string;
  colour: string;
}
/** What a finished run made; sizes in pixels of the scene's grid. */
export interface RunResult {
  trainingPixels: number;
  trainingPolygons: number;
  heldOutPolygons: number;
  classMapSha256: string;
  /** Pixels by class code. */
  pixelsByCode: Record<string, number>;
  areaHaByCode: Record<string, number>;
  overallAccuracy: number | null;
  overallLow: number | null;
  overallHigh: number | null;
  notes: string[];
  /** Keys in the file store. */
  mapKey: string;
  mapNamesKey: string;
  modelKey: string;
  /** Rasters of how sure the map is; runs made before there were layers have none. */
  layerKeys?: Record<RunLayer, string>;
  /** What the classifier made, once steps were applied to it; the fields above then tell of the map after them. */
  raw?: ClassifierMap;
  /** Number of the revision of the post-processing list that the map shows. */
  revision?: number;
}
/** The classifier's own map, which no step changes. */
export type ClassifierMap = Pick<
  RunResult,
  | 'classMapSha256'
  | 'pixelsByCode'
  | 'areaHaByCode'
  | 'overallAccuracy'
  | 'overallLow'
  | 'overallHigh'
  | 'notes'
  | 'mapKey'
  | 'mapNamesKey'
>;

@Entity('runs')
@Unique(['projectId', 'number'])
export class Run {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId' })
  project!: Relation<Project>;
  @Column({ type: 'int' }) number!: number;
  @Column({ type: 'varchar', length: 120 }) name!: string;
  @Column({ type: 'text' }) note!: string;
  @Column({ type: 'uuid' }) sceneId!: string;
  @ManyToOne(() => Scene, { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'sceneId' })
  scene!: Relation<Scene>;
  @Column({ type: 'json' }) recipe!: Recipe;
  /** The class scheme as it stood at the start, in recipe order. */
  @Column({ type: 'json' }) classes!: RunClass[];
  /** The study area as it stood at the start; null is the whole scene. */
  @Column({ type: 'geometry', nullable: true, transformer: geometryTransformer }) studyArea!: ArealGeometry | null;
  /** What the check of the recipe warned of. */
  @Column({ type: 'json' }) warnings!: string[];
  /** SHA-256 over samples, classes, study area and the scene's band digests. */
  @Column({ type: 'char', length: 64 }) inputSha256!: string;
  @Column({ type: 'uuid' }) jobId!: string;
  @OneToOne(() => Job, { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'jobId' })
  job!: Relation<Job>;
  @Column({ type: 'json', nullable: true }) result!: RunResult | null;
  @Column({ type: 'uuid', nullable: true }) startedById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'startedById' })
  startedBy!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
}
