import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A fact about the whole site, by name. */
@Entity('site_settings')
export class SiteSetting {
  @PrimaryColumn({ type: 'varchar', length: 60 }) name!: string;
  @Column({ type: 'varchar', length: 200 }) value!: string;
}
