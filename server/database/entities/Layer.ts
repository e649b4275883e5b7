import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { Device } from './Device.js'

/** One layer of a device's stack, counted from the sunward side; `junctionIndex` says for which junction it absorbs. */
@Entity({ name: 'layer' })
@Index('layer_position_in_device', ['deviceId', 'position'], { unique: true })
export class Layer {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  deviceId: string

  @ManyToOne('Device', 'layers', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'deviceId', foreignKeyConstraintName: 'layer_device_exists' })
  device: Relation<Device>

  @Column('int')
  position: number

  @Column('varchar', { length: 60 })
  name: string

  @Column('varchar', { length: 200 })
  material: string

  @Column('double', { nullable: true })
  thicknessNm: number | null

  @Column('int', { nullable: true })
  junctionIndex: number | null
}
