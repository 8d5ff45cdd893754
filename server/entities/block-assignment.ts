import { Column, CreateDateColumn, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import { Block } from './block.ts';
import { User } from './user.ts';

/** A labeller's part in a block. */
@Entity('block_assignments')
export class BlockAssignment {
  @PrimaryColumn({ type: 'uuid' }) blockId!: string;
  @ManyToOne(() => Block, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'blockId', foreignKeyConstraintName: 'FK_block_assignment_block' })
  block!: Relation<Block>;
  @PrimaryColumn({ type: 'uuid' }) userId!: string;
  @ManyToOne(() => User, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'userId', foreignKeyConstraintName: 'FK_block_assignment_user' })
  user!: Relation<User>;
  @Column({ type: 'datetime', precision: 6, nullable: true }) doneAt!: Date | null;
  @CreateDateColumn() createdAt!: Date;
}
