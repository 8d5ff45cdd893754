import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';
import type { ProjectEvent } from '../../shared/contracts/job.ts';

/** What happened, in order; event streams of every server process read from here. Old rows are swept. */
@Entity('event_entries')
export class EventEntry {
  @PrimaryGeneratedColumn({ type: 'bigint' }) id!: string;
  @Index()
  @Column({ type: 'uuid' })
  projectId!: string;
  @Column({ type: 'json' }) event!: ProjectEvent;
  @Index()
  @CreateDateColumn()
  createdAt!: Date;
}
