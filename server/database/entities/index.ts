import { AuditEvent } from './AuditEvent.js'
import { BenchItem } from './BenchItem.js'
import { BiasSeries } from './BiasSeries.js'
import { Device } from './Device.js'
import { Finding } from './Finding.js'
import { Invitation } from './Invitation.js'
import { Job } from './Job.js'
import { Junction } from './Junction.js'
import { Layer } from './Layer.js'
import { Membership } from './Membership.js'
import { OutboxMail } from './OutboxMail.js'
import { PasswordReset } from './PasswordReset.js'
import { Project } from './Project.js'
import { ProjectThresholds } from './ProjectThresholds.js'
import { RawMeasurement } from './RawMeasurement.js'
import { ReadingMemory } from './ReadingMemory.js'
import { Scan } from './Scan.js'
import { ScanCheck } from './ScanCheck.js'
import { Scenario } from './Scenario.js'
import { SessionRecord } from './SessionRecord.js'
import { SourceFile } from './SourceFile.js'
import { Spectrum } from './Spectrum.js'
import { User } from './User.js'
import { WhatIfModel } from './WhatIfModel.js'

/** Every entity. A new one is one file and one line here, and a migration. */
export const ENTITIES = [
  User,
  SessionRecord,
  PasswordReset,
  Project,
  Membership,
  Invitation,
  OutboxMail,
  AuditEvent,
  Device,
  Junction,
  Layer,
  SourceFile,
  ReadingMemory,
  Scan,
  Spectrum,
  BiasSeries,
  Finding,
  ScanCheck,
  ProjectThresholds,
  Job,
  BenchItem,
  RawMeasurement,
  WhatIfModel,
  Scenario,
]
