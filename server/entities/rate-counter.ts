import { Column, Entity, PrimaryColumn } from 'typeorm';

/** Hits within a window, per key; kept in the database so that several server processes count together. */
@Entity('rate_counters')
export class RateCounter {
  @PrimaryColumn({ type: 'varchar', length: 191 }) key!: string;
  @Column({ type: 'int', unsigned: true }) hits!: number;
  @Column({ type: 'datetime', precision: 6 }) resetAt!: Date;
}
