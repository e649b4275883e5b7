import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Device } from './Device.js'

/** One junction of a device; position 1 is on the sunward side. */
@Entity({ name: 'junction' })
@Index('junction_position_in_device', ['deviceId', 'position'], { unique: true })
export class Junction {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  deviceId: string

  @ManyToOne('Device', 'junctions', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'deviceId', foreignKeyConstraintName: 'junction_device_exists' })
  device: Relation<Device>

  @Column('int')
  position: number

  @Column('varchar', { length: 60 })
  label: string

  @Column('varchar', { length: 200 })
  absorber: string

  @Column('double', { nullable: true })
  nominalGapEv: number | null

  @Column('double', { nullable: true })
  thicknessNm: number | null
}
