import { Column, Entity, JoinColumn, OneToOne, PrimaryColumn, type Relation } from 'typeorm'
import { jsonColumn } from '../transformers.js'
import type { Scan } from './Scan.js'

/** That a scan was checked: on which inputs, what passed, and what could not be checked and why. */
@Entity({ name: 'scan_check' })
export class ScanCheck {
  @PrimaryColumn('uuid')
  scanId: string

  @OneToOne('Scan', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'scanId', foreignKeyConstraintName: 'scan_check_scan_exists' })
  scan: Relation<Scan>

  /** SHA-256 of everything that the checks looked at; the same inputs are not checked twice. */
  @Column('char', { length: 64 })
  inputsHash: string

  @Column('longtext', { transformer: jsonColumn<string[]>() })
  passed: string[]

  @Column('longtext', { transformer: jsonColumn<{ check: string; title: string; reason: string }[]>() })
  notChecked: { check: string; title: string; reason: string }[]

  @Column('datetime', { precision: 3 })
  checkedAt: Date
}
