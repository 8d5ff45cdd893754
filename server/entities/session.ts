import { Column, Entity, Index, PrimaryColumn } from 'typeorm';

/** A signed-in browser; the express-session store keeps its rows here. */
@Entity('sessions')
export class Session {
  @PrimaryColumn({ type: 'varchar', length: 128 }) id!: string;
  @Index()
  @Column({ type: 'uuid', nullable: true })
  userId!: string | null;
  @Column({ type: 'text' }) data!: string;
  @Column({ type: 'varchar', length: 400, default: '' }) userAgent!: string;
  @Column({ type: 'varchar', length: 64, default: '' }) address!: string;
  @Column({ type: 'datetime', precision: 6 }) lastSeenAt!: Date;
  @Index()
  @Column({ type: 'datetime', precision: 6 })
  expiresAt!: Date;
}
