import { Column, Entity, JoinColumn, OneToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { OpticalDescription } from '../../../shared/contract/whatIf.js'
import { jsonColumn } from '../transformers.js'
import type { Device } from './Device.js'

/** The optical description of a device that somebody saved; none for a device whose stack says it all. */
@Entity({ name: 'what_if_model' })
export class WhatIfModel {
  @PrimaryColumn('uuid')
  deviceId: string

  @OneToOne('Device', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'deviceId', foreignKeyConstraintName: 'what_if_model_device_exists' })
  device: Relation<Device>

  @Column('longtext', { transformer: jsonColumn<OpticalDescription>() })
  description: OpticalDescription

  @Column('int')
  version: number
}
