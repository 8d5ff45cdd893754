import { Column, CreateDateColumn, Entity, PrimaryGeneratedColumn, UpdateDateColumn } from 'typeorm';
import type { ArealGeometry } from '../../shared/contracts/geometry.ts';
import { geometryTransformer } from './geometry-column.ts';

@Entity('projects')
export class Project {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'varchar', length: 120 }) name!: string;
  @Column({ type: 'varchar', length: 160, default: '' }) client!: string;
  @Column({ type: 'text' }) description!: string;
  /** Limits drawing, mapping and areas; longitude, latitude on WGS84. */
  @Column({ type: 'geometry', nullable: true, transformer: geometryTransformer }) studyArea!: ArealGeometry | null;
  @Column({ type: 'double', nullable: true }) targetOverallAccuracy!: number | null;
  @Column({ type: 'int', nullable: true }) targetSamplesPerClass!: number | null;
  /** Last numbers given out; never reused. */
  @Column({ type: 'int', default: 0 }) lastSampleNumber!: number;
  @Column({ type: 'int', default: 0 }) lastRunNumber!: number;
  @Column({ type: 'int', default: 1 }) version!: number;
  @CreateDateColumn() createdAt!: Date;
  @UpdateDateColumn() updatedAt!: Date;
}
