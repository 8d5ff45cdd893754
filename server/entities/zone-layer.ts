import {
  Column,
  CreateDateColumn,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { Position } from '../../shared/contracts/geometry.ts';
import { Project } from './project.ts';
import { User } from './user.ts';

/** A zone in degrees on WGS84, as polygons of rings. */
export interface Zone {
  name: string;
  areaHa: number;
  polygons: Position[][][];
}

/** Zones of a project, by which reference points may be drawn and reported. */
@Entity('zone_layers')
export class ZoneLayer {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'FK_zone_layer_project' })
  project!: Relation<Project>;
  @Column({ type: 'varchar', length: 120 }) name!: string;
  @Column({ type: 'json' }) zones!: Zone[];
  @Column({ type: 'uuid', nullable: true }) createdById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'createdById', foreignKeyConstraintName: 'FK_zone_layer_creator' })
  createdBy!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
}
