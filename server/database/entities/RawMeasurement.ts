import { Column, Entity, JoinColumn, OneToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { RawReduction } from '../../../shared/contract/rawPasses.js'
import type { DetectorContent } from '../../../shared/contract/bench.js'
import { jsonColumn } from '../transformers.js'
import type { Scan } from './Scan.js'

/** The columns of one pass as the file holds them: wavelengths in nm, voltages in V. */
export interface RawColumns {
  wavelengthNm: number[]
  /** By the place of the column in its table. */
  byColumn: Record<string, number[]>
}

/** What a scan was reduced from: the raw columns, the calibration of that day, and every factor. */
@Entity({ name: 'raw_measurement' })
export class RawMeasurement {
  @PrimaryColumn('uuid')
  scanId: string

  @OneToOne('Scan', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'scanId', foreignKeyConstraintName: 'raw_measurement_scan_exists' })
  scan: Relation<Scan>

  @Column('longtext', { transformer: jsonColumn<RawReduction>() })
  reduction: RawReduction

  @Column('longtext', { transformer: jsonColumn<RawColumns>() })
  deviceColumns: RawColumns

  @Column('longtext', { transformer: jsonColumn<RawColumns>() })
  referenceColumns: RawColumns

  @Column('varchar', { length: 120 })
  detectorName: string

  @Column('longtext', { transformer: jsonColumn<DetectorContent['curve']>() })
  calibration: DetectorContent['curve']
}
