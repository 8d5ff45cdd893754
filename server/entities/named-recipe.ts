import {
  Column,
  CreateDateColumn,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
  UpdateDateColumn,
  VersionColumn,
  type Relation,
} from 'typeorm';
import type { Recipe } from '../../shared/contracts/run.ts';
import { Project } from './project.ts';
import { User } from './user.ts';

/** A recipe kept under a name, to start runs from. */
@Entity('named_recipes')
@Unique('UQ_named_recipe_name', ['projectId', 'name'])
export class NamedRecipe {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'FK_named_recipe_project' })
  project!: Relation<Project>;
  @Column({ type: 'varchar', length: 120 }) name!: string;
  @Column({ type: 'text' }) note!: string;
  @Column({ type: 'json' }) recipe!: Recipe;
  @Column({ type: 'uuid', nullable: true }) createdById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'createdById', foreignKeyConstraintName: 'FK_named_recipe_user' })
  createdBy!: Relation<User> | null;
  @VersionColumn({ type: 'int' }) version!: number;
  @CreateDateColumn() createdAt!: Date;
  @UpdateDateColumn() updatedAt!: Date;
}
