import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm'
import type { FindingAnswer, Severity } from '../../../shared/contract/findings.js'
import { jsonColumn } from '../transformers.js'
import type { Scan } from './Scan.js'
import type { User } from './User.js'

/** What a check found on a scan, and what somebody answered. A check finds one thing on a scan at most. */
@Entity({ name: 'finding' })
@Index('finding_of_check_on_scan', ['scanId', 'check'], { unique: true })
export class Finding {
  @PrimaryColumn('uuid')
  id: string

  @Column('uuid')
  scanId: string

  @ManyToOne('Scan', { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'scanId', foreignKeyConstraintName: 'finding_scan_exists' })
  scan: Relation<Scan>

  @Column('varchar', { length: 60 })
  check: string

  /** Place among the scan's findings: worst first. */
  @Column('int')
  rank: number

  @Column('varchar', { length: 20 })
  severity: Severity

  @Column('varchar', { length: 200 })
  title: string

  @Column('text')
  message: string

  @Column('text')
  advice: string

  @Column('longtext', { transformer: jsonColumn<[number, number][]>() })
  bandsNm: [number, number][]

  @Column('longtext', { transformer: jsonColumn<Record<string, { value: number; unit: string }>>() })
  numbers: Record<string, { value: number; unit: string }>

  @Column('int')
  junctionPosition: number

  @Column('datetime', { precision: 3 })
  foundAt: Date

  @Column('varchar', { length: 20, nullable: true })
  answerKind: FindingAnswer['kind'] | null

  @Column('uuid', { nullable: true })
  repeatedAsScanId: string | null

  @Column('varchar', { length: 1000 })
  answerReason: string

  @Column('uuid', { nullable: true })
  answeredById: string | null

  @ManyToOne('User', { onDelete: 'RESTRICT', nullable: true })
  @JoinColumn({ name: 'answeredById', foreignKeyConstraintName: 'finding_answerer_exists' })
  answeredBy: Relation<User> | null

  @Column('datetime', { precision: 3, nullable: true })
  answeredAt: Date | null
}
