import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm';
import type { BandQuantity, BandRole } from '../../shared/constants/bands.ts';
import type { BandStatistics } from '../../shared/contracts/scene.ts';
import { Scene } from './scene.ts';

@Entity('bands')
export class Band {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Index()
  @Column({ type: 'uuid' })
  sceneId!: string;
  @ManyToOne(() => Scene, (scene) => scene.bands, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'sceneId' })
  scene!: Relation<Scene>;
  @Column({ type: 'int' }) number!: number;
  @Column({ type: 'varchar', length: 80 }) name!: string;
  @Column({ type: 'varchar', length: 16 }) role!: BandRole;
  @Column({ type: 'double', nullable: true }) centreWavelengthUm!: number | null;
  @Column({ type: 'double', nullable: true }) gsdMeters!: number | null;
  @Column({ type: 'double', default: 1 }) scale!: number;
  @Column({ type: 'double', default: 0 }) offset!: number;
  @Column({ type: 'varchar', length: 16, default: 'digital number' }) quantity!: BandQuantity;
  @Column({ type: 'double', nullable: true }) nodata!: number | null;
  @Column({ type: 'varchar', length: 16 }) dataType!: string;
  /** The band's own grid, which may be coarser than the scene's. */
  @Column({ type: 'int' }) width!: number;
  @Column({ type: 'int' }) height!: number;
  @Column({ type: 'double' }) originX!: number;
  @Column({ type: 'double' }) originY!: number;
  @Column({ type: 'double' }) pixelWidth!: number;
  @Column({ type: 'double' }) pixelHeight!: number;
  @Column({ type: 'json' }) statistics!: BandStatistics;
  @Column({ type: 'char', length: 64 }) sha256!: string;
  /** Where the band file lies in the file store. */
  @Column({ type: 'varchar', length: 200 }) fileKey!: string;
}
