import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import { Project } from './project.ts';
import { User } from './user.ts';

/** An open sampling desk and the sample being changed at it; forgotten when its heartbeat stops. */
@Entity('presences')
export class Presence {
  /** Made by the browser, one for each open desk. */
  @PrimaryColumn({ type: 'uuid' }) deskId!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'FK_presence_project' })
  project!: Relation<Project>;
  @Column({ type: 'uuid' }) userId!: string;
  @ManyToOne(() => User, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'userId', foreignKeyConstraintName: 'FK_presence_user' })
  user!: Relation<User>;
  @Column({ type: 'uuid', nullable: true }) editingSampleId!: string | null;
  @Column({ type: 'datetime', precision: 6 }) seenAt!: Date;
}
