import {
  Column,
  CreateDateColumn,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  OneToMany,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { ArealGeometry, Bounds } from '../../shared/contracts/geometry.ts';
import { Band } from './band.ts';
import { geometryTransformer } from './geometry-column.ts';
import { Project } from './project.ts';
import { User } from './user.ts';

export interface SceneFile {
  name: string;
  bytes: number;
  sha256: string;
  /** Where the upload lies in the file store; null once its bands are written or the ingest has failed. */
  key: string | null;
}
export interface SceneFailure {
  code: string;
  found: string;
  wanted: string;
  advice: string;
}

@Entity('scenes')
export class Scene {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Index()
  @Column({ type: 'uuid' })
  projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId' })
  project!: Relation<Project>;
  @Column({ type: 'varchar', length: 160 }) name!: string;
  @Column({ type: 'date', nullable: true }) acquiredOn!: string | null;
  @Column({ type: 'varchar', length: 16, default: 'ingesting' }) state!: 'ingesting' | 'ready' | 'failed';
  @Column({ type: 'json', nullable: true }) failure!: SceneFailure | null;
  @Column({ type: 'json' }) files!: SceneFile[];
  @Column({ type: 'int', nullable: true }) width!: number | null;
  @Column({ type: 'int', nullable: true }) height!: number | null;
  /** Outer corner of the upper left pixel, in units of the reference system. */
  @Column({ type: 'double', nullable: true }) originX!: number | null;
  @Column({ type: 'double', nullable: true }) originY!: number | null;
  /** Pixel size, both positive; north is up. */
  @Column({ type: 'double', nullable: true }) pixelWidth!: number | null;
  @Column({ type: 'double', nullable: true }) pixelHeight!: number | null;
  @Column({ type: 'varchar', length: 200, nullable: true }) crsName!: string | null;
  @Column({ type: 'int', nullable: true }) crsEpsg!: number | null;
  @Column({ type: 'varchar', length: 400, nullable: true }) crsProj4!: string | null;
  @Column({ type: 'text', nullable: true }) crsWkt!: string | null;
  @Column({ type: 'geometry', nullable: true, transformer: geometryTransformer }) footprint!: ArealGeometry | null;
  @Column({ type: 'json', nullable: true }) bounds!: Bounds | null;
  /** Band roles were guessed from the number of bands and nobody has saved the band table since. */
  @Column({ type: 'boolean', default: false }) guessedRoles!: boolean;
  @Column({ type: 'uuid', nullable: true }) uploadedById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'uploadedById' })
  uploadedBy!: Relation<User> | null;
  @OneToMany(() => Band, (band) => band.scene) bands!: Relation<Band>[];
  @Column({ type: 'int', default: 1 }) version!: number;
  @CreateDateColumn() createdAt!: Date;
}
